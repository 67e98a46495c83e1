/** Gives numbers from 0 (included) to 1 (excluded). The engine never makes its own: it is handed one. */
export type RandomSource = () => number;

/**
 * A repeatable source of random numbers: the same seed gives the same sequence on every machine.
 *
 * @param seed whole number; only its lowest 32 bits matter
 * Source: xoshiro128** of Blackman and Vigna (2018), its state filled through the 32-bit finaliser of MurmurHash3
 * (both from memory); two outputs make the 53 bits of a double.
 */
export function seededRandom(seed: number): RandomSource {
  let counter = seed | 0;
  const fill = (): number => {
    counter = (counter + 0x9e3779b9) | 0;
    let mixed = Math.imul(counter ^ (counter >>> 16), 0x85ebca6b);
    mixed = Math.imul(mixed ^ (mixed >>> 13), 0xc2b2ae35);
    return mixed ^ (mixed >>> 16);
  };
  let s0 = fill();
  let s1 = fill();
  let s2 = fill();
  let s3 = fill();
  const next32 = (): number => {
    const result = Math.imul(rotateLeft(Math.imul(s1, 5), 7), 9) >>> 0;
    const shifted = s1 << 9;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= shifted;
    s3 = rotateLeft(s3, 11);
    return result;
  };
  return () => ((next32() >>> 5) * 2 ** 26 + (next32() >>> 6)) / 2 ** 53;
}

function rotateLeft(value: number, bits: number): number {
  return (value << bits) | (value >>> (32 - bits));
}
