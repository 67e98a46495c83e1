import { POSITION_KINDS, type Side } from '../positions.js';
import { CsvError, readCsv, writeCsv } from './csv-text.js';

/** Columns of a rig's file, in this order; a file may leave out all but the first two. */
export const RIG_CSV_COLUMNS = [
  'place',
  'side',
  'mast',
  'label',
  'construction',
  'diameter_mm',
  'certified_breaking_load_kn',
  'certificate',
  'length_m',
  'upper_terminal',
  'lower_terminal',
  'thread',
  'pin_diameter_mm',
  'batch',
  'fitted_on',
  'notes',
] as const;
type Column = (typeof RIG_CSV_COLUMNS)[number];

/** One line of the file: a place and, where a construction is named, the part in it. */
export interface RigCsvRow {
  line: number;
  kind: string;
  side: Side;
  mast: string;
  /** '' : made from place, side and mast. */
  label: string;
  part: RigCsvPart | null;
  errors: string[];
}

/** A part as the file states it; null stands for "not known". */
export interface RigCsvPart {
  constructionId: string;
  diameterMm: number;
  certifiedBreakingLoadKn: number | null;
  certificate: string;
  lengthM: number | null;
  upperTerminal: string;
  lowerTerminal: string;
  threadSize: string | null;
  pinDiameterMm: number | null;
  batch: string;
  fittedOn: string | null;
  notes: string;
}

/** More lines than any rig has. */
const MOST_LINES = 400;
const SIDES: readonly string[] = ['port', 'starboard', 'centre'];
const PART_COLUMNS = RIG_CSV_COLUMNS.slice(5);

/**
 * Reads a rig's file. What is wrong in a line stands in its `errors`; the line is kept, so that all of them can be
 * mended at once. What only the register knows (constructions, sizes, terminals) is checked there.
 *
 * @throws CsvError for a text that is no CSV, lacks the columns `place` and `side`, names an unknown column or one
 *   twice, or has too many lines
 */
export function readRigCsv(text: string): RigCsvRow[] {
  const [head, ...lines] = readCsv(text);
  if (!head) throw new CsvError('The file is empty.', 1);
  const columns = head.cells.map((name) => name.toLowerCase());
  for (const needed of ['place', 'side']) {
    if (!columns.includes(needed)) {
      throw new CsvError(`The first line must name the column "${needed}".`, head.line);
    }
  }
  columns.forEach((name, index) => {
    if (!(RIG_CSV_COLUMNS as readonly string[]).includes(name)) {
      throw new CsvError(`There is no column "${name}". Known are ${RIG_CSV_COLUMNS.join(', ')}.`, head.line);
    }
    if (columns.indexOf(name) !== index) throw new CsvError(`The column "${name}" stands twice.`, head.line);
  });
  if (lines.length > MOST_LINES) {
    throw new CsvError(`The file has ${lines.length} lines; at most ${MOST_LINES} are taken.`, head.line);
  }
  return lines.map(({ line, cells }) => {
    const errors: string[] = [];
    if (cells.length > columns.length && cells.slice(columns.length).some((cell) => cell !== '')) {
      errors.push(`The line has ${cells.length} cells, the first line names ${columns.length} columns.`);
    }
    return rowOf(line, (column) => cells[columns.indexOf(column)] ?? '', errors);
  });
}

/** The file of a rig, or with no rows the template to fill in. */
export function writeRigCsv(rows: readonly Omit<RigCsvRow, 'line' | 'errors'>[]): string {
  return writeCsv([
    RIG_CSV_COLUMNS,
    ...rows.map(({ kind, side, mast, label, part }) => [
      kind,
      side,
      mast,
      label,
      ...(part
        ? [
            part.constructionId,
            String(part.diameterMm),
            numberText(part.certifiedBreakingLoadKn),
            part.certificate,
            numberText(part.lengthM),
            part.upperTerminal,
            part.lowerTerminal,
            part.threadSize ?? '',
            numberText(part.pinDiameterMm),
            part.batch,
            part.fittedOn ?? '',
            part.notes,
          ]
        : RIG_CSV_COLUMNS.slice(4).map(() => '')),
    ]),
  ]);
}

function rowOf(line: number, cell: (column: Column) => string, errors: string[]): RigCsvRow {
  const kind = cell('place').toLowerCase();
  const side = cell('side').toLowerCase();
  if (!POSITION_KINDS.some((known) => known.kind === kind)) {
    errors.push(
      kind === '' ? 'The column "place" is empty.' : `"${kind}" is no kind of place; see the template.`,
    );
  }
  if (!SIDES.includes(side)) {
    errors.push(`The side must be port, starboard or centre${side === '' ? '' : `, not "${side}"`}.`);
  }
  return {
    line,
    kind,
    side: side as Side,
    mast: cell('mast').toLowerCase() || 'main',
    label: cell('label'),
    part: partOf(cell, errors),
    errors,
  };
}

function partOf(cell: (column: Column) => string, errors: string[]): RigCsvPart | null {
  const constructionId = cell('construction');
  if (constructionId === '') {
    const filled = PART_COLUMNS.filter((column) => cell(column) !== '');
    if (filled.length > 0) {
      errors.push(`A part needs its construction; filled in without it: ${filled.join(', ')}.`);
    }
    return null;
  }
  const diameterMm = numberIn(cell, 'diameter_mm', errors);
  if (diameterMm === null && cell('diameter_mm') === '') errors.push('A part needs its diameter_mm.');
  const fittedOn = cell('fitted_on');
  if (fittedOn !== '' && !/^\d{4}-\d{2}-\d{2}$/.test(fittedOn)) {
    errors.push(`fitted_on must be a day such as 2026-04-30, not "${fittedOn}".`);
  }
  return {
    constructionId,
    diameterMm: diameterMm ?? 0,
    certifiedBreakingLoadKn: numberIn(cell, 'certified_breaking_load_kn', errors),
    certificate: cell('certificate'),
    lengthM: numberIn(cell, 'length_m', errors),
    upperTerminal: cell('upper_terminal').toLowerCase() || 'unknown',
    lowerTerminal: cell('lower_terminal').toLowerCase() || 'unknown',
    threadSize: cell('thread') || null,
    pinDiameterMm: numberIn(cell, 'pin_diameter_mm', errors),
    batch: cell('batch'),
    fittedOn: fittedOn || null,
    notes: cell('notes'),
  };
}

/** A positive number, with a decimal point or comma. */
function numberIn(cell: (column: Column) => string, column: Column, errors: string[]): number | null {
  const text = cell(column);
  if (text === '') return null;
  const plain = text.replace(',', '.');
  const value = /^\d+(\.\d+)?$/.test(plain) ? Number(plain) : NaN;
  if (value > 0) return value;
  errors.push(`${column} must be a number above zero, not "${text}".`);
  return null;
}

function numberText(value: number | null): string {
  return value === null ? '' : String(value);
}
