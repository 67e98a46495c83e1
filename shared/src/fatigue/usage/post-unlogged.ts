import type { BandRate } from './band-rates.js';
import type { UsageGroup, UsageState } from './usage-state.js';

/** Hours without recorded loads in one state and wind band. */
export interface UnloggedHours extends UsageGroup {
  hours: number;
}

/** Unlogged hours with the damage they are charged. */
export interface PostedHours extends UnloggedHours {
  damagePerHour: number;
  damage: number;
  /** What the rate stands on, in words. */
  words: string;
}

/** Unlogged hours that nothing recorded answers for. */
export interface UncoveredHours extends UnloggedHours {
  words: string;
}

/** What unlogged hours add to an account. */
export interface UnloggedPosting {
  posted: PostedHours[];
  notCovered: UncoveredHours[];
  damage: number;
}

const STATE_WORDS: Readonly<Record<UsageState, string>> = {
  sailing: 'sailing',
  motoring: 'motoring',
  'at-rest-afloat': 'at rest afloat',
  'ashore-mast-up': 'ashore with the mast up',
  'mast-out': 'with the mast out',
};

/**
 * Charges unlogged hours, each once, at the recorded rate of their own state and wind band. It is the only thing done
 * about them: nothing is scaled by coverage as well. Hours in more wind than was ever recorded in their state are
 * never extrapolated to: they are listed as not covered. With the mast out nothing is charged.
 *
 * Hours whose wind is not known take the rate of their state over all its wind; a band below or between recorded
 * ones takes the next recorded one above.
 *
 * @param hours any order
 * @param rates from bandRates
 * @throws RangeError for negative hours
 */
export function postUnlogged(hours: readonly UnloggedHours[], rates: readonly BandRate[]): UnloggedPosting {
  const posted: PostedHours[] = [];
  const notCovered: UncoveredHours[] = [];
  let damage = 0;
  for (const entry of hours) {
    if (!(entry.hours >= 0)) throw new RangeError(`Hours must be zero or more, not ${entry.hours}.`);
    if (entry.hours === 0) continue;
    const found = rateFor(entry, rates);
    if (typeof found === 'string') {
      notCovered.push({ ...entry, words: found });
      continue;
    }
    const charged = entry.hours * found.damagePerHour;
    posted.push({ ...entry, ...found, damage: charged });
    damage += charged;
  }
  return { posted, notCovered, damage };
}

function rateFor(
  { state, band }: UsageGroup,
  rates: readonly BandRate[],
): { damagePerHour: number; words: string } | string {
  if (state === 'mast-out') return { damagePerHour: 0, words: 'With the mast out nothing is loaded.' };
  const own = rates.filter((rate) => rate.state === state);
  const name = STATE_WORDS[state];
  if (own.length === 0) return `No loads were recorded ${name}.`;
  const windKnown = own[0].fromBand !== null;
  if (band === null || !windKnown) {
    const hours = own.reduce((sum, rate) => sum + rate.hours, 0);
    const damage = own.reduce((sum, rate) => sum + rate.hours * rate.damagePerHour, 0);
    return {
      damagePerHour: damage / hours,
      words: `Rate of ${rounded(hours)} h recorded ${name}, any wind.`,
    };
  }
  const covering = own
    .filter((rate) => (rate.toBand ?? -Infinity) >= band)
    .sort((one, other) => (one.toBand ?? 0) - (other.toBand ?? 0))
    .at(0);
  if (covering === undefined) {
    return `No loads were recorded ${name} in this much wind; the highest recorded band is ${Math.max(...own.map(({ toBand }) => toBand ?? 0))}.`;
  }
  const bands =
    covering.fromBand === covering.toBand
      ? `${covering.toBand}`
      : `${covering.fromBand} to ${covering.toBand}`;
  return {
    damagePerHour: covering.damagePerHour,
    words: `Rate of ${rounded(covering.hours)} h recorded ${name} in wind band ${bands}.`,
  };
}

function rounded(hours: number): string {
  return String(Number(hours.toPrecision(3)));
}
