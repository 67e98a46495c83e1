import type { DataTableColumn } from './data-table';

/**
 * Rows as RFC 4180 text. Text cells are quoted, and one that a spreadsheet would run as a formula gets an apostrophe
 * before it; numbers are left alone, or -3.2 kN would become text.
 */
export function toCsv<Row>(rows: readonly Row[], columns: readonly DataTableColumn<Row>[]): string {
  const kept = columns.filter((column) => column.value !== undefined);
  const lines = [kept.map((column) => quote(column.title))];
  for (const row of rows) lines.push(kept.map((column) => cell(column.value?.(row) ?? null)));
  return lines.map((line) => `${line.join(',')}\r\n`).join('');
}

function cell(value: string | number | null): string {
  if (value === null) return '';
  return typeof value === 'number' ? String(value) : quote(value);
}

function quote(text: string): string {
  const harmless = /^[=+\-@\t\r\n]/.test(text) ? `'${text}` : text;
  return `"${harmless.replace(/"/g, '""')}"`;
}
