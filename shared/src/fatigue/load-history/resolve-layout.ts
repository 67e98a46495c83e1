import { columnsNamed } from './columns-named.js';
import { logText } from './log-text.js';
import { LogConfigError, type LoadLogConfig } from './load-log.js';
import type { CsvLayout } from './csv-scanner.js';
import {
  isAveraged,
  looksLikeUnits,
  recogniseLog,
  type LogRecognition,
  type RecognisedColumn,
} from './recognise-log.js';
import { readColumnHeader } from './read-column-header.js';
import { splitTableLine } from './split-table-line.js';
import { DELIMITERS, tableLines } from './table-lines.js';

/** Where in a log stands what its configuration asks for. */
export interface ResolvedLayout {
  csv: CsvLayout;
  /** Bytes before the text. */
  skipBytes: number;
  /** For each channel its place among the scanned columns; two channels may read the same one. */
  channelPlaces: number[];
  /** Channels whose header states another unit than configured, with that unit. */
  otherUnit: Map<number, string>;
  /** Channels whose header speaks of averages. */
  averaged: number[];
  /** Whether times say nothing about their zone and the configuration does not either. */
  naiveTime: boolean;
}

/**
 * Finds the configured columns in a log's first bytes.
 *
 * @throws LogConfigError when the log is no text table, or a column is missing, ambiguous or not a time
 */
export function resolveLayout(head: Uint8Array, config: LoadLogConfig): ResolvedLayout {
  let recognition = recogniseLog(head, config);
  if (recognition.encoding === 'binary' || recognition.encoding === 'utf-16') {
    throw new LogConfigError(recognition.problems[0].message);
  }
  const { columns, delimiter, skipLines } = tableWith(head, recognition, config);
  if (delimiter !== recognition.delimiter) recognition = recogniseLog(head, { ...config, delimiter });
  const places: number[] = [];
  const channelPlaces: number[] = [];
  const otherUnit = new Map<number, string>();
  const averaged: number[] = [];
  const otherDelimiter = delimiterThatWouldFit(head, config, columns);
  if (otherDelimiter !== null) throw new LogConfigError(otherDelimiter);
  config.channels.forEach(({ column, unit }, channel) => {
    const { index, header } = columnNamed(columns, column);
    if (!places.includes(index)) places.push(index);
    channelPlaces.push(places.indexOf(index));
    const stated = readColumnHeader(header).unit;
    if (stated !== 'unknown' && stated !== unit) otherUnit.set(channel, stated);
    if (isAveraged(header)) averaged.push(channel);
  });
  let time: CsvLayout['time'] = null;
  let naiveTime = false;
  if ('column' in config.time) {
    const { index } = columnNamed(columns, config.time.column);
    if (places.includes(index)) {
      throw new LogConfigError(`the column "${config.time.column}" is configured as time and as a load`);
    }
    const known = recognition.time?.index === index ? recognition.time : null;
    const format = config.time.format ?? known?.format ?? 'iso';
    naiveTime =
      format === 'iso' && known?.hasOffset === false && config.time.utcOffsetMinutesForNaive === undefined;
    time = { column: index, format, naiveOffsetMinutes: config.time.utcOffsetMinutesForNaive ?? 0 };
  }
  return {
    csv: {
      delimiter: delimiter.charCodeAt(0),
      decimalComma: recognition.decimalComma,
      lineEnd: recognition.lineEnd === 'cr' ? 13 : 10,
      skipLines,
      columns: places,
      time,
    },
    skipBytes: recognition.encoding === 'utf-8-bom' ? 3 : 0,
    channelPlaces,
    otherUnit,
    averaged,
    naiveTime,
  };
}

interface NamedTable {
  columns: RecognisedColumn[];
  /** Line of the names, counted from 1. */
  headerLine: number;
  delimiter: string;
  /** Physical lines above the first row. */
  skipLines: number;
}

/**
 * The table's columns. The header is the first line that has all configured names, whatever the rows below it
 * look like; only without such a line the recognised table is taken, for example when there is no header.
 */
function tableWith(head: Uint8Array, recognition: LogRecognition, config: LoadLogConfig): NamedTable {
  const wanted = config.channels.map(({ column }) => column);
  if ('column' in config.time) wanted.push(config.time.column);
  const text = logText(head, recognition.encoding === 'utf-8-bom' ? 3 : 0);
  const { lines, lineNumbers } = tableLines(text, recognition.lineEnd === 'cr', false);
  const delimiters = [recognition.delimiter, ...(config.delimiter === undefined ? DELIMITERS : [])];
  for (const delimiter of delimiters) {
    for (let i = 0; i < lines.length; i++) {
      const columns = splitTableLine(lines[i], delimiter).map((header, index) => {
        const { name, unit } = readColumnHeader(header);
        return { index, header, name, unit, kind: 'other' as const, firstValues: [] };
      });
      if (!wanted.every((name) => columnsNamed(columns, name).length > 0)) continue;
      const below = i + 1 < lines.length ? splitTableLine(lines[i + 1], delimiter) : [];
      const filled = below.filter((cell) => cell !== '');
      const first = filled.length > 0 && looksLikeUnits(filled) ? i + 2 : i + 1;
      return { columns, headerLine: lineNumbers[i], delimiter, skipLines: lineNumbers[first] - 1 };
    }
  }
  const { columns, headerLine, delimiter, firstRowLine } = recognition;
  return { columns, headerLine, delimiter, skipLines: firstRowLine - 1 };
}

function columnNamed(columns: RecognisedColumn[], name: string): RecognisedColumn {
  const found = columnsNamed(columns, name);
  if (found.length === 0) {
    throw new LogConfigError(
      `the log has no column ${quoted(name)}; it has ${listed(columns)}. Match the columns anew, or export the log with that column`,
    );
  }
  if (found.length > 1) {
    const places = found.map(({ index }) => index + 1).join(' and ');
    throw new LogConfigError(
      `the log has the column ${quoted(name)} twice, as columns ${places}. Give each its own name in the header and add the log again`,
    );
  }
  return found[0];
}

const NAMES_LISTED = 12;
const NAME_LENGTH = 40;

/** The names a table has, few and short enough for one sentence whatever the file holds. */
function listed(columns: readonly RecognisedColumn[]): string {
  if (columns.length === 0) return 'none';
  const names = columns.slice(0, NAMES_LISTED).map(({ header }) => quoted(header));
  const more = columns.length - names.length;
  return names.join(', ') + (more > 0 ? ` and ${more} more` : '');
}

function quoted(name: string): string {
  const shown = name.replace(/\p{Cc}/gu, '\u{fffd}');
  return `"${shown.length > NAME_LENGTH ? `${shown.slice(0, NAME_LENGTH)}…` : shown}"`;
}

const DELIMITER_WORDS: Readonly<Record<string, string>> = {
  ',': 'commas',
  ';': 'semicolons',
  '\t': 'tabs',
  '|': 'bars',
  ' ': 'blanks',
};

/** What to say when a wanted column is missing only because cells were parted at the wrong character; else null. */
function delimiterThatWouldFit(
  head: Uint8Array,
  config: LoadLogConfig,
  columns: RecognisedColumn[],
): string | null {
  const chosen = config.delimiter;
  if (chosen === undefined) return null;
  const wanted = config.channels.map(({ column }) => column);
  if (wanted.every((name) => columnsNamed(columns, name).length > 0)) return null;
  for (const delimiter of DELIMITERS) {
    if (delimiter === chosen) continue;
    const other = tableWith(head, recogniseLog(head, { ...config, delimiter }), { ...config, delimiter });
    if (!wanted.every((name) => columnsNamed(other.columns, name).length > 0)) continue;
    const words = (character: string) => DELIMITER_WORDS[character] ?? `"${character}"`;
    return `the cells of line ${other.headerLine} are parted by ${words(delimiter)}, not by ${words(chosen)}. Choose that separator`;
  }
  return null;
}
