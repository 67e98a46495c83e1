import type { HistoryRow } from './load-history.js';

export interface CsvStyle {
  columns: readonly string[];
  /** Decimals of a load; the recording's own resolution. */
  decimals: number;
  /** Adds a column of apparent wind in knots. */
  wind: boolean;
}

/** Header line of a log: time, the load columns with their unit, and the wind if it was recorded. */
export function csvHeader(style: CsvStyle): string {
  return ['time', ...style.columns, ...(style.wind ? ['wind_kn'] : [])].join(',') + '\n';
}

/** One line of a log; a null load is an empty cell, and words stand as they are. */
export function csvLine(
  row: Omit<HistoryRow, 'loads'> & { loads: readonly (number | string | null)[] },
  style: CsvStyle,
): string {
  const cells = row.loads.map((load) =>
    typeof load === 'number' ? load.toFixed(style.decimals) : (load ?? ''),
  );
  if (style.wind) cells.push(row.windKn.toFixed(1));
  return `${isoSeconds(row.timeMs)},${cells.join(',')}\n`;
}

/** ISO 8601 in UTC, without the milliseconds where they are zero. */
function isoSeconds(timeMs: number): string {
  return new Date(timeMs).toISOString().replace('.000Z', 'Z');
}
