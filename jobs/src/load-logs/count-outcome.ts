import type { Envelope, LogFinding } from '@stayledger/shared/fatigue/load-history/load-log';

/** One column of a log after counting, as it crosses from the counting thread. */
export interface CountedChannel {
  column: string;
  /** Grid it was counted on, kN; coarser than asked for where memory had to be bounded. */
  step: number;
  samples: number;
  missing: number;
  turningPoints: number;
  closedCycles: number;
  minKn: number | null;
  maxKn: number | null;
  maxAtMs: number | null;
  envelope: Envelope;
  /** Share of the damage that rounding to the grid may have changed. */
  roundingShare: number;
  /** Encoded. */
  spectrum: Uint8Array;
}

/** What became of a file: counted, or the reason why nobody can count it. */
export type CountOutcome =
  | {
      ok: true;
      rows: number;
      fromMs: number | null;
      toMs: number | null;
      loggedHours: number;
      sampleRateHz: number | null;
      findings: LogFinding[];
      channels: CountedChannel[];
    }
  | { ok: false; code: string; message: string };
