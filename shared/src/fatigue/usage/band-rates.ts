import type { UsageState } from './usage-state.js';

/** What was recorded in one state and wind band. */
export interface BandRecord {
  state: UsageState;
  /** Band number, weakest wind first (for example Beaufort); null where wind is not known. */
  band: number | null;
  /** Mean wind speed of the hours, any unit, the same for all; null where not known. */
  windSpeed: number | null;
  hours: number;
  cycles: number;
  damage: number;
}

/** Damage per hour of neighbouring bands taken together. */
export interface BandRate {
  state: UsageState;
  /** Bands it stands for, both included; null where wind is not known. */
  fromBand: number | null;
  toBand: number | null;
  hours: number;
  cycles: number;
  damagePerHour: number;
  /** True where, even merged, there is too little record to stand on. */
  thin: boolean;
}

/** Less record than this in a band is not a rate of its own. Engineering estimates without a source. */
export const LEAST_HOURS = 2;
export const LEAST_CYCLES = 500;

/** True where a band has too little record: less than two hours or 500 cycles. */
export function isThin(record: { hours: number; cycles: number }): boolean {
  return record.hours < LEAST_HOURS || record.cycles < LEAST_CYCLES;
}

/**
 * Damage per hour by state and wind band. A band with too little record is merged with its neighbour: the one above
 * where there is one, because its rate is the higher, else the one below. Bands nobody sailed in are left out.
 *
 * @param records any order; records of one state and band add up
 * @returns by state, weakest wind first; the highest `toBand` of a state is the highest wind it was recorded in
 * @throws RangeError for negative figures, or a state with known and unknown wind both
 */
export function bandRates(records: readonly BandRecord[]): BandRate[] {
  const rates: BandRate[] = [];
  for (const state of new Set(records.map((record) => record.state))) {
    rates.push(...ratesOfState(addedUp(records.filter((record) => record.state === state))));
  }
  return rates;
}

type Merged = Omit<BandRecord, 'windSpeed'> & { toBand: number | null };

function addedUp(records: readonly BandRecord[]): Merged[] {
  const byBand = new Map<number | null, Merged>();
  for (const { state, band, hours, cycles, damage } of records) {
    if (!(hours >= 0 && cycles >= 0 && damage >= 0)) {
      throw new RangeError(`Hours, cycles and damage must be zero or more (${state}, band ${band}).`);
    }
    const known = byBand.get(band) ?? { state, band, toBand: band, hours: 0, cycles: 0, damage: 0 };
    byBand.set(band, {
      ...known,
      hours: known.hours + hours,
      cycles: known.cycles + cycles,
      damage: known.damage + damage,
    });
  }
  if (byBand.has(null) && byBand.size > 1) {
    throw new RangeError('Hours of one state must all have a wind band, or none.');
  }
  return [...byBand.values()]
    .filter(({ hours }) => hours > 0)
    .sort((one, other) => (one.band ?? 0) - (other.band ?? 0));
}

function ratesOfState(bands: readonly Merged[]): BandRate[] {
  const merged: Merged[] = [];
  let waiting: Merged | null = null;
  for (const band of bands) {
    const next: Merged = waiting === null ? band : joined(waiting, band);
    if (isThin(next)) {
      waiting = next;
    } else {
      merged.push(next);
      waiting = null;
    }
  }
  if (waiting !== null) {
    const below = merged.pop();
    merged.push(below === undefined ? waiting : joined(below, waiting));
  }
  return merged.map((band) => ({
    state: band.state,
    fromBand: band.band,
    toBand: band.toBand,
    hours: band.hours,
    cycles: band.cycles,
    damagePerHour: band.damage / band.hours,
    thin: isThin(band),
  }));
}

function joined(lower: Merged, upper: Merged): Merged {
  return {
    state: lower.state,
    band: lower.band,
    toBand: upper.toBand,
    hours: lower.hours + upper.hours,
    cycles: lower.cycles + upper.cycles,
    damage: lower.damage + upper.damage,
  };
}
