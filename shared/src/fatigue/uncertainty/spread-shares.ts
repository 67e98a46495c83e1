import { damageAt } from './damage-at.js';
import type { LifeDraws } from './life-draws.js';
import type { PartRecord } from './life-record.js';
import { type Doubt, partLife } from './part-life.js';

/** Which doubt makes how much of the spread of a part's life. */
export interface SpreadShare {
  doubt: Doubt;
  /** Of the sum of all variances of ln(life); all shares add up to 1. */
  share: number;
  /** Standard deviation of ln(damage or strength) from this doubt alone. */
  lnSd: number;
}

const DAMAGE_DOUBTS: readonly Doubt[] = [
  'gain',
  'basis',
  'stress',
  'sampling',
  'days',
  'seasons',
  'unlogged',
  'carried-in',
];

/**
 * Shares of the spread: each doubt is let loose alone, all others held at their central values, and the variance it
 * gives ln(damage) at the stated time is compared with the sum of all.
 *
 * @param atYears time from today, above zero; the remaining years of the part are the usual choice
 * @returns largest share first, of the worst detail of the part; doubts without any spread are left out
 * @throws RangeError for a part without details or a time that is not above zero
 */
export function spreadShares(draws: LifeDraws, part: PartRecord, atYears: number): SpreadShare[] {
  if (!(atYears > 0)) throw new RangeError(`A time above zero is needed, not ${atYears}.`);
  const worst = worstDetail(draws, part, atYears);
  const single: PartRecord = { ...part, details: [part.details[worst]] };
  const variances = new Map<Doubt, number>();
  for (const doubt of DAMAGE_DOUBTS) {
    const { paths } = partLife(draws, single, new Set([doubt]));
    const logs = Array.from({ length: draws.draws }, (_, i) =>
      Math.log(damageAt(paths[0], i, atYears, draws.use.yearProfile)),
    );
    variances.set(doubt, variance(logs));
  }
  variances.set('curve', part.details[worst].curveLnSd ** 2);
  variances.set('miner', variance([...partLife(draws, single, new Set<Doubt>(['miner'])).lnMinerSums]));
  const sum = [...variances.values()].reduce((total, part) => total + part, 0);
  return [...variances]
    .filter(([, value]) => value > 1e-9 * sum)
    .map(([doubt, value]) => ({ doubt, share: value / sum, lnSd: Math.sqrt(value) }))
    .sort((one, other) => other.share - one.share);
}

/** The detail closest to its failure when all doubts are left aside. */
function worstDetail(draws: LifeDraws, part: PartRecord, atYears: number): number {
  if (part.details.length === 0) throw new RangeError(`${part.name} has no assessed detail.`);
  const { paths } = partLife(draws, part, new Set<Doubt>());
  let worst = 0;
  let most = -Infinity;
  paths.forEach((path, index) => {
    const damage = damageAt(path, 0, atYears, draws.use.yearProfile);
    if (damage > most) [worst, most] = [index, damage];
  });
  return worst;
}

function variance(values: readonly number[]): number {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  return values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length;
}
