import type { ForceUnit } from '../../units/force.js';
import type { LoadSpectrum } from '../rainflow/load-spectrum.js';

/** How a time cell is written. */
export type LogTimeFormat = 'iso' | 'epoch-s' | 'epoch-ms';

/** From one instant on, local clocks of the vessel's zone are this far ahead of UTC. */
export interface ZoneOffset {
  /** First instant of this offset, epoch milliseconds; `-Infinity` is not needed, the first entry reaches back. */
  fromMs: number;
  /** Minutes ahead of UTC. */
  offsetMinutes: number;
}

/** Where the time of a row comes from: a column, or a constant rate. */
export type LogTimeSource =
  | {
      column: string;
      /** Left out: guessed from the first rows. */
      format?: LogTimeFormat;
      /** For ISO times without an offset: minutes their clock is ahead of UTC; left out: 0. */
      utcOffsetMinutesForNaive?: number;
    }
  | {
      rateHz: number;
      /** Instant of the first row, ISO UTC; left out: the log has no time, and everything falls on day 0. */
      startAt?: string;
    };

/** One column of loads to be counted. */
export interface ChannelConfig {
  /** Header of the column, in full or without its unit. */
  column: string;
  unit: ForceUnit;
  /** Grid in kN the loads are rounded to; 0 counts exactly. */
  step: number;
  /** What the part or the sensor can physically carry, kN; higher loads are reported as implausible. */
  limitKn?: number;
}

/** How a load log is to be read and counted. */
export interface LoadLogConfig {
  /** One character; left out: recognised. */
  delimiter?: string;
  /** Left out: recognised. */
  decimalComma?: boolean;
  time: LogTimeSource;
  /** Ascending offsets of the vessel's zone; left out: days are UTC days. */
  zoneOffsets?: ZoneOffset[];
  channels: ChannelConfig[];
  /** Longer pauses between rows are unlogged time, seconds; left out: 3 sample periods, at least 1 s. */
  gapLimitS?: number;
  /** Bounds on memory per channel; left out: `DEFAULT_BOUNDS`. */
  bounds?: Partial<CountingBounds>;
}

/** When a channel's count is carried on, on a coarser grid, to keep memory bounded. */
export interface CountingBounds {
  /** Points waiting in the residue. */
  residuePoints: number;
  /** Distinct closed cycles. */
  cycles: number;
}

/** Room for every honest log; some 100 MiB a channel in the worst case. */
export const DEFAULT_BOUNDS: Readonly<CountingBounds> = { residuePoints: 2_000_000, cycles: 2_000_000 };

/** What can be said about a log. */
export type LogFindingCode =
  | 'gap'
  | 'time-backwards'
  | 'time-repeated'
  | 'time-unreadable'
  | 'time-ambiguous'
  | 'short-row'
  | 'unreadable-cell'
  | 'missing-cell'
  | 'stuck'
  | 'spike'
  | 'saturation'
  | 'implausible-load'
  | 'low-rate'
  | 'averaged'
  | 'unit-doubt'
  | 'truncated'
  | 'residue-capped'
  | 'no-rows';

/** One thing found in a log, wherever and however often it occurs. */
export interface LogFinding {
  code: LogFindingCode;
  severity: 'info' | 'warning' | 'serious';
  /** The load column concerned. */
  column?: string;
  /** First and last instant concerned, epoch milliseconds. */
  fromMs?: number;
  toMs?: number;
  /** First line concerned, counted from 1. */
  line?: number;
  /** How often. */
  count: number;
  /** What was found and where, in plain words. */
  message: string;
  /** What was done about it, or what mends it. */
  action: string;
}

/**
 * Smallest and largest load per stretch of time, for drawing: extremes are never lost. Buckets are aligned to
 * whole multiples of their length; the length doubles whenever more than 4096 would be needed.
 */
export interface Envelope {
  bucketMs: number;
  /** Start of the first bucket, epoch milliseconds (from the first row when the log has no time). */
  fromMs: number;
  /** kN; NaN for a bucket without samples. */
  minKn: Float64Array;
  maxKn: Float64Array;
}

/** What was counted in one column. */
export interface ChannelResult {
  column: string;
  /** Levels in steps of `spectrum.step` kN; made each time it is asked for. */
  spectrum: LoadSpectrum;
  /** The same as `encodeSpectrum` stores it, without taking the memory of the spectrum. Not copied between threads. */
  encodedSpectrum(): Uint8Array;
  samples: number;
  /** Rows without a usable sample. */
  missing: number;
  /** NaN without samples. */
  minKn: number;
  maxKn: number;
  maxAtMs: number | null;
  envelope: Envelope;
}

/** What was read and counted of a load log. */
export interface LoadLogResult {
  rows: number;
  fromMs: number | null;
  toMs: number | null;
  /** Hours covered by rows; gaps over the limit are not in it. */
  loggedHours: number;
  sampleRateHz: number | null;
  channels: ChannelResult[];
  findings: LogFinding[];
}

/** A log cannot be read as configured: no such column, a column twice, not a text table. One line of text. */
export class LogConfigError extends Error {
  override name = 'LogConfigError';
}
