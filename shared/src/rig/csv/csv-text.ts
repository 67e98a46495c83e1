/** A line of a CSV text with the number of the line it starts on. */
export interface CsvLine {
  line: number;
  cells: string[];
}

/** A text that is not CSV, with the line where it goes wrong. */
export class CsvError extends Error {
  constructor(
    message: string,
    readonly line: number,
  ) {
    super(message);
    this.name = 'CsvError';
  }
}

/** What a spreadsheet would run as a formula when it stands first in a cell. */
const FORMULA_START = /^[=+\-@\t\r]/;

/**
 * Reads comma or semicolon separated text: quoted cells may hold separators, line ends and doubled quotes; empty lines
 * are left out. The separator is the one the first line has more of. An apostrophe that {@link writeCsv} put in front
 * of a formula is taken off again.
 *
 * @throws CsvError for a quote that never ends
 * Source: RFC 4180, except for the semicolon, which spreadsheets write where the comma is a decimal sign.
 */
export function readCsv(text: string): CsvLine[] {
  const source = text.replace(/^\uFEFF/, '');
  const separator = separatorOf(source);
  const lines: CsvLine[] = [];
  let cells: string[] = [];
  let cell = '';
  let quotedFrom = 0;
  let line = 1;
  let startedOn = 1;
  const endCell = () => {
    cells.push(withoutGuard(cell.trim()));
    cell = '';
  };
  const endLine = () => {
    endCell();
    if (cells.some((value) => value !== '')) lines.push({ line: startedOn, cells });
    cells = [];
  };
  for (let index = 0; index < source.length; index += 1) {
    const character = source[index];
    if (character === '\n') line += 1;
    if (quotedFrom > 0) {
      if (character !== '"') cell += character;
      else if (source[index + 1] === '"') {
        cell += '"';
        index += 1;
      } else quotedFrom = 0;
    } else if (character === '"' && cell.trim() === '') {
      cell = '';
      quotedFrom = line;
    } else if (character === separator) endCell();
    else if (character === '\n') {
      endLine();
      startedOn = line;
    } else if (character !== '\r') cell += character;
  }
  if (quotedFrom > 0) throw new CsvError('A quotation mark opens here and is never closed.', quotedFrom);
  endLine();
  return lines;
}

/**
 * Writes rows as CSV with commas. A text that a spreadsheet would take for a formula gets an apostrophe in front; plain
 * numbers stay as they are.
 */
export function writeCsv(rows: readonly (readonly string[])[]): string {
  return rows.map((row) => row.map(cellText).join(',') + '\r\n').join('');
}

function cellText(value: string): string {
  const isNumber = value !== '' && Number.isFinite(Number(value));
  const guarded = FORMULA_START.test(value) && !isNumber ? `'${value}` : value;
  return /[",;\r\n]/.test(guarded) ? `"${guarded.replaceAll('"', '""')}"` : guarded;
}

function withoutGuard(value: string): string {
  return value.startsWith("'") && FORMULA_START.test(value.slice(1)) ? value.slice(1) : value;
}

function separatorOf(text: string): ',' | ';' {
  const first = text.slice(0, Math.max(0, text.search(/[\r\n]/)) || undefined);
  return first.split(';').length > first.split(',').length ? ';' : ',';
}
