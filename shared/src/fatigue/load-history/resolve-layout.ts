import { logText } from './log-text.js';
import { LogConfigError, type LoadLogConfig } from './load-log.js';
import type { CsvLayout } from './csv-scanner.js';
import { isAveraged, recogniseLog, type LogRecognition, type RecognisedColumn } from './recognise-log.js';
import { readColumnHeader } from './read-column-header.js';
import { splitTableLine } from './split-table-line.js';

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
  const recognition = recogniseLog(head, config);
  if (recognition.encoding === 'binary' || recognition.encoding === 'utf-16') {
    throw new LogConfigError(recognition.problems[0].message);
  }
  const { columns, skipLines } = tableWith(head, recognition, config);
  const places: number[] = [];
  const channelPlaces: number[] = [];
  const otherUnit = new Map<number, string>();
  const averaged: number[] = [];
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
      delimiter: recognition.delimiter.charCodeAt(0),
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

/**
 * The columns and the lines above the first row. When the recognised header lacks a configured column but an
 * other line near the top has them all, that line is the header.
 */
function tableWith(
  head: Uint8Array,
  recognition: LogRecognition,
  config: LoadLogConfig,
): { columns: RecognisedColumn[]; skipLines: number } {
  const recognised = { columns: recognition.columns, skipLines: recognition.firstRowLine - 1 };
  const wanted = config.channels.map(({ column }) => column);
  if ('column' in config.time) wanted.push(config.time.column);
  if (wanted.every((name) => matching(recognition.columns, name).length > 0)) return recognised;
  const text = logText(head, recognition.encoding === 'utf-8-bom' ? 3 : 0);
  const lines = text.split(recognition.lineEnd === 'cr' ? '\r' : /\r?\n/).slice(0, 50);
  for (let i = 0; i < lines.length; i++) {
    const columns = splitTableLine(lines[i], recognition.delimiter).map((header, index) => {
      const { name, unit } = readColumnHeader(header);
      return { index, header, name, unit, kind: 'other' as const, firstValues: [] };
    });
    if (!wanted.every((name) => matching(columns, name).length > 0)) continue;
    return { columns, skipLines: Math.max(i + 1, recognition.firstRowLine - 1) };
  }
  return recognised;
}

/** Columns a configured name can mean: the header itself, else its name without unit, else either in any case. */
function matching(columns: RecognisedColumn[], name: string): RecognisedColumn[] {
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

function columnNamed(columns: RecognisedColumn[], name: string): RecognisedColumn {
  const found = matching(columns, name);
  if (found.length === 0) {
    const known = columns.map(({ header }) => `"${header}"`).join(', ');
    throw new LogConfigError(`the log has no column "${name}"; it has ${known === '' ? 'none' : known}`);
  }
  if (found.length > 1) {
    const places = found.map(({ index }) => index + 1).join(' and ');
    throw new LogConfigError(`the log has the column "${name}" twice, as columns ${places}`);
  }
  return found[0];
}
