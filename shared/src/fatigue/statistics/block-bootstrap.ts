import type { RandomSource } from './seeded-random.js';

/** How future use is drawn from recorded days. */
export interface BlockBootstrapInput {
  /** Damage of each recorded day, in order. */
  dailyDamage: ArrayLike<number>;
  /** Days that stay together, because the weather of one day is that of the next; see {@link usualBlockLength}. */
  blockLengthDays: number;
  /** Days to draw for one replicate. */
  forecastDays: number;
  replicates: number;
  /** Blocks may start on any day ('moving', wrapping nothing) or only on multiples of the block length. */
  blocks: 'moving' | 'non-overlapping';
  random: RandomSource;
}

/** Block length to start from: the cube root of the number of days, at least 1. */
export function usualBlockLength(days: number): number {
  return Math.max(1, Math.round(Math.cbrt(days)));
}

/**
 * Block bootstrap over days: each replicate strings blocks of recorded days together, drawn with replacement, until
 * the forecast is filled (the last block is cut), and sums their damage.
 *
 * @returns one sum per replicate
 * @throws RangeError for no days, or a block length that is not a whole number between 1 and the number of days
 * Source: moving-block bootstrap of Kuensch (1989), from memory.
 */
export function blockBootstrap(input: BlockBootstrapInput): Float64Array {
  const { dailyDamage, blockLengthDays, forecastDays, replicates, blocks, random } = input;
  const days = dailyDamage.length;
  if (days === 0) throw new RangeError('A bootstrap needs at least one recorded day.');
  if (!(Number.isInteger(blockLengthDays) && blockLengthDays >= 1 && blockLengthDays <= days)) {
    throw new RangeError(`A block must hold between 1 and ${days} days, not ${blockLengthDays}.`);
  }
  const stride = blocks === 'moving' ? 1 : blockLengthDays;
  const starts = Math.floor((days - blockLengthDays) / stride) + 1;
  const sums = new Float64Array(replicates);
  for (let replicate = 0; replicate < replicates; replicate++) {
    let sum = 0;
    for (let drawn = 0; drawn < forecastDays; drawn += blockLengthDays) {
      const start = Math.floor(random() * starts) * stride;
      const end = start + Math.min(blockLengthDays, forecastDays - drawn);
      for (let day = start; day < end; day++) sum += dailyDamage[day];
    }
    sums[replicate] = sum;
  }
  return sums;
}
