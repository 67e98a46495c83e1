import type { RandomSource } from './seeded-random.js';

/**
 * A source of standard normal numbers made of uniform ones.
 *
 * @param random source of uniform numbers
 * Source: polar method of Marsaglia and Bray (1964), from memory.
 */
export function normalSource(random: RandomSource): () => number {
  let spare = NaN;
  return () => {
    if (!Number.isNaN(spare)) {
      const value = spare;
      spare = NaN;
      return value;
    }
    for (;;) {
      const x = 2 * random() - 1;
      const y = 2 * random() - 1;
      const square = x * x + y * y;
      if (square >= 1 || square === 0) continue;
      const scale = Math.sqrt((-2 * Math.log(square)) / square);
      spare = y * scale;
      return x * scale;
    }
  };
}
