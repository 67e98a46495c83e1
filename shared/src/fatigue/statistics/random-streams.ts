import { type RandomSource, seededRandom } from './seeded-random.js';

/** Gives an independent, repeatable source of random numbers for every name. */
export type RandomStreams = (name: string) => RandomSource;

/**
 * Named sources of random numbers from one seed. Whatever is drawn under one name does not depend on what else is
 * drawn, so that fitting a further part never moves the date of another.
 *
 * @param seed whole number; stored with every result it made
 * Source: the name is hashed by FNV-1a, 32 bits (Fowler, Noll and Vo, from memory) and mixed with the seed.
 */
export function randomStreams(seed: number): RandomStreams {
  return (name) => {
    let hash = 0x811c9dc5;
    for (let i = 0; i < name.length; i++) {
      const unit = name.charCodeAt(i);
      hash = Math.imul(hash ^ (unit & 0xff), 0x01000193);
      hash = Math.imul(hash ^ (unit >>> 8), 0x01000193);
    }
    return seededRandom(hash ^ Math.imul(seed, 0x9e3779b1));
  };
}
