import type { RecognisedColumn } from './recognise-log.js';

/** Columns a configured name can mean: the header itself, else its name without unit, else either in any case. */
export function columnsNamed(columns: readonly RecognisedColumn[], name: string): RecognisedColumn[] {
  const wanted = name.trim();
  const rules: ((column: RecognisedColumn) => boolean)[] = [
    (column) => column.header === wanted,
    (column) => column.name === wanted,
    (column) => column.header.toLowerCase() === wanted.toLowerCase(),
    (column) => column.name.toLowerCase() === wanted.toLowerCase(),
  ];
  for (const rule of rules) {
    const found = columns.filter(rule);
    if (found.length > 0) return found;
  }
  return [];
}
