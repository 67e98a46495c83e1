import type { ForceUnit } from '../../units/force.js';
import { firstBinaryByte } from './first-binary-byte.js';
import type { LogTimeFormat } from './load-log.js';
import { logText } from './log-text.js';
import { parseLoadText } from './parse-load-text.js';
import { parseTimeText } from './parse-time-text.js';
import { isUnitText, readColumnHeader, withUnitText, type ColumnHeader } from './read-column-header.js';
import { splitTableLine } from './split-table-line.js';
import { DELIMITERS, tableLines } from './table-lines.js';

/** What a column seems to hold. */
export type LogColumnKind = 'time' | 'load' | 'wind-speed' | 'wind-angle' | 'other';

/** One column as recognised. */
export interface RecognisedColumn {
  /** Place, counted from 0. */
  index: number;
  /** The header as it stands in the file; `column 1` and so on without one. */
  header: string;
  /** The header without its unit. */
  name: string;
  unit: ForceUnit | 'unknown';
  kind: LogColumnKind;
  /** The first cells, as text. */
  firstValues: string[];
}

/** Something about the table a person should know or decide. */
export interface LogProblem {
  code:
    | 'empty'
    | 'not-text'
    | 'encoding'
    | 'no-header'
    | 'no-rows'
    | 'column-twice'
    | 'unit-unknown'
    | 'unit-ambiguous'
    | 'no-time'
    | 'time-unreadable'
    | 'time-zone-unknown'
    | 'no-load'
    | 'averaged';
  message: string;
  line?: number;
  column?: string;
}

/** What the first bytes of a load log show. */
export interface LogRecognition {
  encoding: 'utf-8' | 'utf-8-bom' | 'utf-16' | 'binary';
  lineEnd: 'lf' | 'crlf' | 'cr';
  delimiter: string;
  decimalComma: boolean;
  /** Lines counted from 1; 0: there is none. */
  headerLine: number;
  unitLine: number;
  firstRowLine: number;
  columns: RecognisedColumn[];
  time: { index: number; format: LogTimeFormat; hasOffset: boolean } | null;
  sampleRateHz: number | null;
  /** At most 8 first rows, as text. */
  rows: string[][];
  problems: LogProblem[];
}

/** Bytes of a log's beginning that are enough to recognise it. */
export const RECOGNITION_BYTES = 1 << 16;

const ROWS_SHOWN = 8;

/**
 * Recognises a load log from its first bytes: delimiter, decimal sign, header, units, time, rate.
 *
 * @param head the first bytes, not compressed; 64 KiB are enough (`RECOGNITION_BYTES`)
 * @param known what is known already and is not to be guessed
 */
export function recogniseLog(
  head: Uint8Array,
  known: { delimiter?: string; decimalComma?: boolean } = {},
): LogRecognition {
  const hasBom = head[0] === 0xef && head[1] === 0xbb && head[2] === 0xbf;
  const recognition: LogRecognition = {
    encoding: hasBom ? 'utf-8-bom' : 'utf-8',
    lineEnd: 'lf',
    delimiter: known.delimiter ?? ',',
    decimalComma: known.decimalComma ?? false,
    headerLine: 0,
    unitLine: 0,
    firstRowLine: 1,
    columns: [],
    time: null,
    sampleRateHz: null,
    rows: [],
    problems: [],
  };
  const { problems } = recognition;
  const obstacle = notText(head);
  if (obstacle !== null) {
    recognition.encoding = obstacle.code === 'encoding' ? 'utf-16' : 'binary';
    problems.push(obstacle);
    return recognition;
  }

  const text = logText(head, hasBom ? 3 : 0);
  const onlyCr = !text.includes('\n') && text.includes('\r');
  recognition.lineEnd = onlyCr ? 'cr' : text.includes('\r\n') ? 'crlf' : 'lf';
  const { lines, lineNumbers } = tableLines(
    text,
    recognition.lineEnd === 'cr',
    head.length >= RECOGNITION_BYTES,
  );

  const tables = DELIMITERS.filter((d) => known.delimiter === undefined || d === known.delimiter);
  if (known.delimiter !== undefined && tables.length === 0) tables.push(known.delimiter);
  const best = tables
    .map((delimiter) => tableOf(lines, delimiter, known.decimalComma))
    .reduce((one, two) => (two.score > one.score ? two : one));
  recognition.delimiter = best.delimiter;
  recognition.decimalComma = best.decimalComma;

  if (best.firstRow < 0) {
    describeWithoutRows(recognition, best.cells, lineNumbers);
    return recognition;
  }
  const { headerLine, unitLine } = findHeader(best);
  recognition.headerLine = headerLine < 0 ? 0 : lineNumbers[headerLine];
  recognition.unitLine = unitLine < 0 ? 0 : lineNumbers[unitLine];
  recognition.firstRowLine = lineNumbers[best.firstRow];
  if (headerLine < 0) {
    problems.push({
      code: 'no-header',
      message: 'There is no header row; the columns are called column 1, column 2 and so on.',
      line: recognition.firstRowLine,
    });
  }
  const rows = best.cells.slice(best.firstRow).filter((cells) => cells.length > 1 || cells[0] !== '');
  recognition.rows = rows.slice(0, ROWS_SHOWN);
  const headers = headerLine < 0 ? [] : best.cells[headerLine];
  const units = unitLine < 0 ? [] : best.cells[unitLine];
  describeColumns(recognition, headers, units, rows);
  return recognition;
}

function notText(head: Uint8Array): LogProblem | null {
  if (head.length === 0) return { code: 'empty', message: 'The file is empty.' };
  if ((head[0] === 0xff && head[1] === 0xfe) || (head[0] === 0xfe && head[1] === 0xff)) {
    return {
      code: 'encoding',
      message: 'The file is UTF-16 text. Save it as UTF-8 and add it again.',
      line: 1,
    };
  }
  const at = firstBinaryByte(head);
  if (at < 0) return null;
  const what = head[at] === 0 ? 'is zero' : 'is a control character, as are many others';
  return { code: 'not-text', message: `The file is not a text table: byte ${at + 1} ${what}.`, line: 1 };
}

interface Table {
  delimiter: string;
  decimalComma: boolean;
  cells: string[][];
  /** Index of the first line of figures; -1: none. */
  firstRow: number;
  /** Cells in most lines. */
  width: number;
  score: number;
}

/** The lines cut at one delimiter, and how much they then look like a table of figures. */
function tableOf(lines: string[], delimiter: string, knownComma: boolean | undefined): Table {
  const cells = lines.map((line) => splitTableLine(line, delimiter));
  const decimalComma = knownComma ?? (delimiter !== ',' && commaDecimals(cells));
  const isRow = (line: string[]) => isRowOfFigures(line, decimalComma);
  const rows = cells.filter(isRow);
  const widths = new Map<number, number>();
  for (const row of rows) widths.set(row.length, (widths.get(row.length) ?? 0) + 1);
  let width = 1;
  let lineCount = 0;
  for (const [size, count] of widths) {
    if (count > lineCount || (count === lineCount && size > width)) {
      width = size;
      lineCount = count;
    }
  }
  const firstRow = cells.findIndex((line) => line.length >= Math.max(1, width - 1) && isRow(line));
  // The right delimiter leaves cells that are figures as a whole, below as many names.
  let score = 0;
  for (const row of rows) if (row.length === width) score += figuresIn(row, decimalComma);
  const above = cells.slice(0, Math.max(0, firstRow)).filter((line) => line.some((cell) => cell !== ''));
  if (above.length > 0 && above[above.length - 1].length !== width) score /= 3;
  return { delimiter, decimalComma, cells, firstRow, width, score };
}

function commaDecimals(cells: string[][]): boolean {
  let commas = 0;
  let points = 0;
  for (const line of cells) {
    for (const cell of line) {
      if (/^[+-]?\d+,\d+$/.test(cell)) commas++;
      else if (/^[+-]?\d+\.\d+$/.test(cell)) points++;
    }
  }
  return commas > points;
}

function isRowOfFigures(line: string[], decimalComma: boolean): boolean {
  const figures = figuresIn(line, decimalComma);
  return figures > 0 && figures * 2 >= line.filter((cell) => cell !== '').length;
}

/** Cells that are wholly a number or a time. */
function figuresIn(line: string[], decimalComma: boolean): number {
  let figures = 0;
  for (const cell of line) {
    if (cell === '') continue;
    if (parseLoadText(cell, decimalComma) !== null || parseTimeText(cell, 'iso') !== null) figures++;
  }
  return figures;
}

/** The header is the nearest line of names above the first row; a line of units may stand between them. */
function findHeader({ cells, firstRow, width }: Table): { headerLine: number; unitLine: number } {
  const above: number[] = [];
  for (let i = firstRow - 1; i >= 0 && above.length < 2; i--) {
    const filled = cells[i].filter((cell) => cell !== '');
    if (filled.length === 0) continue;
    // A line with far fewer cells is a remark above the table.
    if (cells[i].length < Math.max(1, width - 1)) break;
    above.push(i);
  }
  if (above.length === 0) return { headerLine: -1, unitLine: -1 };
  const nearest = cells[above[0]].filter((cell) => cell !== '');
  if (above.length === 2 && looksLikeUnits(nearest)) return { headerLine: above[1], unitLine: above[0] };
  return { headerLine: above[0], unitLine: -1 };
}

/** Whether the filled cells of a line are all units, as in a row of units below a header. */
export function looksLikeUnits(filled: string[]): boolean {
  return filled.every((cell) => {
    const text = cell.replace(/^[[({]\s*|\s*[\])}]$/g, '');
    return isUnitText(text) || /^(-+|UTC|ISO.*|hh:.*|h|sec|time)$/i.test(text);
  });
}

function describeWithoutRows(recognition: LogRecognition, cells: string[][], lineNumbers: number[]): void {
  recognition.problems.push({ code: 'no-rows', message: 'There is no row of figures in the file.' });
  const header = cells.findIndex((line) => line.some((cell) => cell !== ''));
  if (header < 0) return;
  recognition.headerLine = lineNumbers[header];
  recognition.firstRowLine = lineNumbers[header] + 1;
  describeColumns(recognition, cells[header], [], []);
}

function describeColumns(
  recognition: LogRecognition,
  headers: string[],
  units: string[],
  rows: string[][],
): void {
  const { problems, decimalComma } = recognition;
  const width = Math.max(headers.length, ...rows.slice(0, ROWS_SHOWN).map((row) => row.length));
  const seen = new Set<string>();
  const parts: ColumnHeader[] = [];
  for (let index = 0; index < width; index++) {
    const header = headers[index] ?? (headers.length === 0 ? `column ${index + 1}` : '');
    const column = withUnitText(readColumnHeader(header), units[index] ?? '');
    parts.push(column);
    if (header !== '' && seen.has(header)) {
      problems.push({
        code: 'column-twice',
        message: `The column "${header}" stands in the header twice.`,
        line: recognition.headerLine,
        column: header,
      });
    }
    seen.add(header);
    const filled = rows.map((row) => row[index] ?? '').filter((cell) => cell !== '');
    recognition.columns.push({
      index,
      header,
      name: column.name,
      unit: column.unit,
      kind: 'other',
      firstValues: rows.slice(0, ROWS_SHOWN).map((row) => row[index] ?? ''),
    });
    recognition.columns[index].kind = kindOf(column, filled, decimalComma);
  }
  // A delimiter at the end of each line makes a last column without name and content.
  const last = recognition.columns[width - 1];
  if (width > 1 && last.header === '' && last.firstValues.every((cell) => cell === '')) {
    recognition.columns.pop();
  }
  chooseTime(recognition, rows);
  describeLoads(recognition, parts);
}

function kindOf(column: ColumnHeader, filled: string[], decimalComma: boolean): LogColumnKind {
  const { name, unit, unitText } = column;
  if (filled.length > 0 && timeFormatOf(filled) === 'iso') return 'time';
  const numbers = filled.filter((cell) => parseLoadText(cell, decimalComma) !== null).length;
  if (/^(time|times?tamp|epoch|unix.*|utc.*|date.?time|t)$/i.test(name)) return 'time';
  if (numbers * 2 < filled.length) return 'other';
  if (unit !== 'unknown') return 'load';
  const words = ` ${name
    .replaceAll(/([a-z])([A-Z])/g, '$1 $2')
    .toLowerCase()
    .replaceAll(/[_\-./]/g, ' ')} `;
  if (/ (aws|tws) | wind (speed|spd|kn|kts?) | (windspeed|windspd) | gust /.test(words)) return 'wind-speed';
  if (/ (awa|twa|awd|twd) | wind (angle|dir|direction) | (windangle|winddir) /.test(words))
    return 'wind-angle';
  if (/ wind /.test(words)) return /deg|rad|°/.test(unitText) ? 'wind-angle' : 'wind-speed';
  const others =
    / (lat|latitude|lon|lng|longitude|heading|hdg|cog|sog|stw|bsp|speed|heel|roll|pitch|trim|yaw|rudder|temp|temperature|depth|pressure|baro|battery|voltage|id|row|index|no|nr|date|state|mode|sail|quality|valid|status) /;
  if (
    others.test(words) ||
    ['deg', 'rad', '°', '°C', 'C', 'K', 'V', 'mV', 'Hz', '%', 's', 'ms', 'm/s', 'kts', 'knots'].includes(
      unitText,
    )
  ) {
    return 'other';
  }
  return 'load';
}

/** The first column that holds instants; guesses how they are written, and from them the rate. */
function chooseTime(recognition: LogRecognition, rows: string[][]): void {
  const { columns, problems } = recognition;
  for (const column of columns) {
    if (column.kind !== 'time') continue;
    const cells = rows.map((row) => row[column.index] ?? '').filter((cell) => cell !== '');
    const format = timeFormatOf(cells);
    if (format === null || recognition.time !== null) {
      if (format === null && cells.length > 0) {
        problems.push({
          code: 'time-unreadable',
          message: `The times in "${column.header}" are not readable, for example "${cells[0]}": ISO 8601 or seconds or milliseconds since 1970 are.`,
          line: recognition.firstRowLine,
          column: column.header,
        });
      }
      column.kind = 'other';
      continue;
    }
    const times = cells.map((cell) => parseTimeText(cell, format)).filter((time) => time !== null);
    const hasOffset = times.every((time) => time.hasOffset);
    recognition.time = { index: column.index, format, hasOffset };
    recognition.sampleRateHz = rateOf(times.map((time) => time.ms));
    if (!hasOffset) {
      problems.push({
        code: 'time-zone-unknown',
        message: `The times in "${column.header}" do not say which zone they are in.`,
        column: column.header,
      });
    }
  }
  if (recognition.time === null && rows.length > 0) {
    problems.push({
      code: 'no-time',
      message:
        'No column of times was recognised; say which one it is, or at what rate the rows were recorded.',
    });
  }
}

function timeFormatOf(cells: string[]): LogTimeFormat | null {
  if (cells.length === 0) return null;
  // A few spoilt cells do not make another format.
  const needed = Math.ceil(cells.length * 0.9);
  if (cells.filter((cell) => parseTimeText(cell, 'iso') !== null).length >= needed) return 'iso';
  const seconds = cells.map((cell) => parseTimeText(cell, 'epoch-ms')).filter((time) => time !== null);
  if (seconds.length < needed) return null;
  // Seconds since 1970 pass 10^11 only in the year 5138; milliseconds passed it in 1973.
  const largest = Math.max(...seconds.map((time) => Math.abs(time.ms)));
  return largest >= 1e11 ? 'epoch-ms' : 'epoch-s';
}

/** Rows per second by the median pause between the rows. */
function rateOf(timesMs: number[]): number | null {
  const pauses: number[] = [];
  for (let i = 1; i < timesMs.length; i++) {
    if (timesMs[i] > timesMs[i - 1]) pauses.push(timesMs[i] - timesMs[i - 1]);
  }
  if (pauses.length === 0) return null;
  pauses.sort((a, b) => a - b);
  return Number((1000 / pauses[pauses.length >> 1]).toPrecision(6));
}

function describeLoads(recognition: LogRecognition, parts: ColumnHeader[]): void {
  const { columns, problems } = recognition;
  for (const { kind, header, unit, index } of columns) {
    if (kind !== 'load') continue;
    const { doubt } = parts[index];
    if (doubt !== null) {
      problems.push({
        code: 'unit-ambiguous',
        message: `The unit of "${header}" is not certain: ${doubt}. Please choose it.`,
        line: recognition.headerLine,
        column: header,
      });
    } else if (unit === 'unknown') {
      problems.push({
        code: 'unit-unknown',
        message: `The header "${header}" names no unit of force. Please choose it.`,
        line: recognition.headerLine,
        column: header,
      });
    }
    if (isAveraged(header)) {
      problems.push({
        code: 'averaged',
        message: `"${header}" seems to hold averages; peaks within each interval are lost.`,
        line: recognition.headerLine,
        column: header,
      });
    }
  }
  if (columns.length > 0 && !columns.some((column) => column.kind === 'load')) {
    problems.push({ code: 'no-load', message: 'No column of loads was recognised.' });
  }
}

/** Whether a header says that its column holds averages of an interval. */
export function isAveraged(header: string): boolean {
  return /(^|[\s_.-])(avg|average|averaged|mean)($|[\s_.[(-])/i.test(header);
}
