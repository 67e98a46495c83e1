import { HORIZON_YEARS } from '../life/rule-date.js';
import type { LifeDraws } from './life-draws.js';
import type { PartRecord } from './life-record.js';
import { type Doubt, type PartLife, partLife } from './part-life.js';
import type { UnconfirmedEstimate } from './provisional-range.js';
import { yearsToFailureProbability } from './years-to-failure-probability.js';

/** Something unknown, and how much knowing it would tell. */
export interface Narrowing {
  /** The doubt or input. */
  key: string;
  /** What to do about it, in words. */
  words: string;
  /** Months it would take off the range from the 5th to the 95th percentile of the life. */
  months: number;
}

/** Doubts somebody can do something about. Scatter of curves and of the Miner sum is not among them. */
const REMEDIES: readonly { doubts: readonly Doubt[]; key: string; words: string }[] = [
  { doubts: ['gain'], key: 'gain', words: 'A calibration of the load cell.' },
  { doubts: ['basis'], key: 'basis', words: 'A sensor on this part itself.' },
  { doubts: ['sampling'], key: 'sampling', words: 'A faster recording rate.' },
  { doubts: ['days'], key: 'days', words: 'More days with recorded loads.' },
  { doubts: ['seasons'], key: 'seasons', words: 'Logs of further seasons.' },
  { doubts: ['unlogged'], key: 'unlogged', words: 'Logs of the hours that have none.' },
  { doubts: ['carried-in'], key: 'carried-in', words: 'A record of the use before the first log.' },
  { doubts: ['stress'], key: 'stress', words: 'A strain measurement at the detail.' },
];

const MONTHS_PER_YEAR = 12;

/**
 * What would narrow a date, by how many months each would take off the range: for doubts, the range with all of them less
 * the range with that one resolved; for unconfirmed estimates, the distance between the dates at their two ends.
 *
 * @param draws shared draws of the vessel
 * @param estimates inputs nobody has confirmed
 * @returns largest first; what would take off less than one month is left out
 * @throws RangeError for a part without details
 */
export function whatWouldNarrow(
  draws: LifeDraws,
  part: PartRecord,
  estimates: readonly UnconfirmedEstimate[] = [],
): Narrowing[] {
  if (part.details.length === 0) throw new RangeError(`${part.name} has no assessed detail.`);
  const all: Doubt[] = [...REMEDIES.flatMap(({ doubts }) => doubts), 'curve', 'miner'];
  const whole = rangeYears(partLife(draws, part, new Set(all)));
  const fromDoubts = REMEDIES.map(({ doubts, key, words }) => {
    const rest = new Set(all.filter((doubt) => !doubts.includes(doubt)));
    return { key, words, months: (whole - rangeYears(partLife(draws, part, rest))) * MONTHS_PER_YEAR };
  });
  const fromEstimates = estimates
    .filter(({ confirmed }) => !confirmed)
    .map(({ input, words, remainingYears: [one, other] }) => ({
      key: input,
      words,
      months: Math.abs(Math.min(one, HORIZON_YEARS) - Math.min(other, HORIZON_YEARS)) * MONTHS_PER_YEAR,
    }));
  return [...fromDoubts, ...fromEstimates]
    .filter(({ months }) => months >= 1)
    .sort((one, other) => other.months - one.months);
}

function rangeYears(life: PartLife): number {
  const years = (probability: number): number =>
    Math.min(yearsToFailureProbability(life, probability, HORIZON_YEARS), HORIZON_YEARS);
  return years(0.95) - years(0.05);
}
