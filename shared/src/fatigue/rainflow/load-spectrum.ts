/**
 * What rainflow counting leaves of a stretch of load history.
 *
 * Two spectra of neighbouring stretches merge into exactly the spectrum of both (`mergeSpectra`), so
 * chunks of a file, logs of a season and seasons of a life can be counted anywhere and joined in time order.
 *
 * Equal loads are told apart by time: of two equal turning points the later one counts as the higher, by
 * nothing. Without that rule the loads of the closed cycles would still not depend on where a history was cut,
 * but their days would, because either of two equal peaks can be the one that is paired first. The price is
 * that a pair which closes only by a tie may stand in the residue as two halves instead of one whole cycle;
 * `closeTies` gives the view in which ties close, and every count and damage is the same in both.
 */

/**
 * Closed cycles as parallel arrays, sorted by (low, high) without repetition.
 * `low` and `high` are whole levels when the spectrum's step is above 0 (load = level * step), and raw loads
 * when it is 0. `count` is the number of whole cycles.
 */
export interface CycleTable {
  low: Float64Array;
  high: Float64Array;
  count: Float64Array;
}

/** The closed cycles whose higher extreme fell on one day. */
export interface DayCycles {
  /** Days since 1970-01-01 in the vessel's zone; 0 when the log has no time. */
  day: number;
  cycles: CycleTable;
}

/** Closed cycles per day and the residue of a stretch of load history. */
export interface LoadSpectrum {
  /** Grid of the levels in load units (kN for a load log); 0: no grid, loads stand as they were read. */
  step: number;
  /** Ascending by day; only days with cycles. */
  days: DayCycles[];
  /** Turning points not yet paired, in time order, first and last sample included. */
  residue: Float64Array;
  /** The day of each residue point. */
  residueDay: Int32Array;
  /** Samples counted; missing ones are not. */
  samples: number;
  /** Turning points of the whole stretch, first and last sample included, repeated values once. */
  turningPoints: number;
}

/**
 * The spectrum of no history at all: the identity of `mergeSpectra`.
 *
 * @param step grid in load units, 0 for none
 */
export function emptySpectrum(step: number): LoadSpectrum {
  return {
    step,
    days: [],
    residue: new Float64Array(0),
    residueDay: new Int32Array(0),
    samples: 0,
    turningPoints: 0,
  };
}
