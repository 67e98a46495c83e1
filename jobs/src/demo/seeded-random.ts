/**
 * A reproducible source of chance for invented histories: the small fast counter generator "sfc32" (Doty-Humphrey,
 * PractRand; from memory). The same seed gives the same history on every machine. Not for secrets.
 */
export class SeededRandom {
  #a = 0;
  #b = 0;
  #c = 0;
  #counter = 1;

  constructor(seed: string) {
    for (const char of seed) {
      this.#a = (Math.imul(this.#a ^ char.charCodeAt(0), 0x9e3779b1) + 0x85ebca6b) | 0;
      this.#b = (Math.imul(this.#b + char.charCodeAt(0), 0xc2b2ae35) ^ (this.#a >>> 13)) | 0;
    }
    for (let i = 0; i < 16; i++) this.uniform();
  }

  /** Evenly from 0 (included) to 1 (excluded). */
  uniform(): number {
    const sum = (((this.#a + this.#b) | 0) + this.#counter) | 0;
    this.#counter = (this.#counter + 1) | 0;
    this.#a = this.#b ^ (this.#b >>> 9);
    this.#b = (this.#c + (this.#c << 3)) | 0;
    this.#c = ((this.#c << 21) | (this.#c >>> 11)) + sum;
    return (sum >>> 0) / 4294967296;
  }

  between(low: number, high: number): number {
    return low + (high - low) * this.uniform();
  }

  /** Standard normal, by the polar form of Box and Muller. */
  normal(): number {
    for (;;) {
      const x = 2 * this.uniform() - 1;
      const y = 2 * this.uniform() - 1;
      const r = x * x + y * y;
      if (r > 0 && r < 1) return x * Math.sqrt((-2 * Math.log(r)) / r);
    }
  }
}
