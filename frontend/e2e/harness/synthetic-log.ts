/**
 * A load history for the journeys, invented: a mean load under way, waves upon it, and a squall now and then. It is a
 * pure function of the row, so that every run sends the same bytes.
 */
export interface SyntheticLog {
  columns: readonly string[];
  rows: number;
  /** ISO day the log starts on, at 06:00 UTC. */
  startOn: string;
}

const WAVE_PERIOD_S = 7;
const SQUALL_EVERY_S = 5400;
const SQUALL_S = 600;

function loadKn(second: number, column: number): number {
  const wave = Math.sin((2 * Math.PI * second) / WAVE_PERIOD_S + column);
  const swell = Math.sin((2 * Math.PI * second) / 311 + 2 * column);
  const inSquall = second % SQUALL_EVERY_S < SQUALL_S;
  return 6 + (inSquall ? 2 : 0) + (inSquall ? 2.4 : 1.1) * wave + 0.8 * swell;
}

/** One row per second. */
export function syntheticLog({ columns, rows, startOn }: SyntheticLog): Buffer {
  const start = Date.parse(`${startOn}T06:00:00Z`);
  const lines = [`time,${columns.join(',')}`];
  for (let second = 0; second < rows; second += 1) {
    const loads = columns.map((_, column) => loadKn(second, column).toFixed(3));
    lines.push(`${new Date(start + second * 1000).toISOString()},${loads.join(',')}`);
  }
  return Buffer.from(`${lines.join('\n')}\n`);
}
