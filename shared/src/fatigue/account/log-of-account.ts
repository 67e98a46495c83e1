import type { LoadSpectrum } from '../rainflow/load-spectrum.js';

/** One load log as an account sees it: when it began, and what counting left of the channel that serves the part. */
export interface LogOfAccount {
  loadLogId: string;
  /** Instant of the first sample, ms since 1970-01-01 UTC. */
  fromMs: number;
  spectrum: LoadSpectrum;
}

/**
 * Logs in the order their loads happened, whatever the order they were posted in. Logs that begin together (which
 * the service refuses for one part) keep a fixed order by id, so that the fold stays a function of the set alone.
 */
export function inTimeOrder<T extends Pick<LogOfAccount, 'loadLogId' | 'fromMs'>>(logs: readonly T[]): T[] {
  return [...logs].sort(
    (a, b) => a.fromMs - b.fromMs || (a.loadLogId < b.loadLogId ? -1 : a.loadLogId > b.loadLogId ? 1 : 0),
  );
}
