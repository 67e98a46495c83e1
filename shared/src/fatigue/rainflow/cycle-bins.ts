import { emptyCycleTable } from './cycle-table.js';
import type { CycleTable } from './load-spectrum.js';

const FIRST_SLOTS = 1024;
const WORDS = 4;

/**
 * Closed cycles being counted: a hash table from (low, high) to a number of cycles.
 *
 * Whole levels, the usual case, take 16 bytes a bin in one typed array, so that a bin is one cache line and the
 * garbage collector has nothing to walk. The first extreme that is no 32-bit whole number moves everything into
 * a table of doubles.
 */
export class CycleBins {
  private words = new Int32Array(FIRST_SLOTS * WORDS);
  private counts = new Uint32Array(this.words.buffer);
  private wide: WideBins | null;
  private slots = FIRST_SLOTS;
  private used = 0;

  /** @param whole whether the extremes are whole levels; false: raw loads */
  constructor(private readonly whole: boolean) {
    this.wide = whole ? null : new WideBins();
  }

  /** Number of distinct (low, high) pairs. */
  get size(): number {
    return this.wide === null ? this.used : this.wide.size;
  }

  /** Adds `cycles` cycles between two extremes. */
  add(low: number, high: number, cycles = 1): void {
    const lowWord = low | 0;
    const highWord = high | 0;
    if (this.wide !== null || lowWord !== low || highWord !== high || cycles > 0xffff) {
      this.addWide(low, high, cycles);
      return;
    }
    const words = this.words;
    const mask = this.slots - 1;
    let slot = (Math.imul(lowWord, 0x9e3779b1) ^ Math.imul(highWord, 0x85ebca6b)) >>> 0;
    slot = (slot ^ (slot >>> 15)) & mask;
    for (;;) {
      const at = slot << 2;
      const count = this.counts[at + 2];
      if (count === 0) {
        words[at] = lowWord;
        words[at + 1] = highWord;
        this.counts[at + 2] = cycles;
        if (++this.used * 2 > this.slots) this.grow();
        return;
      }
      if (words[at] === lowWord && words[at + 1] === highWord) {
        if (count > 0xfff00000) this.addWide(low, high, cycles);
        else this.counts[at + 2] = count + cycles;
        return;
      }
      slot = (slot + 1) & mask;
    }
  }

  /** The cycles counted so far, sorted. */
  table(): CycleTable {
    if (this.wide !== null) return this.wide.table();
    const { words, counts, used } = this;
    if (used === 0) return emptyCycleTable();
    const low = new Int32Array(used);
    const high = new Int32Array(used);
    const count = new Uint32Array(used);
    let n = 0;
    for (let at = 0; n < used; at += WORDS) {
      if (counts[at + 2] === 0) continue;
      low[n] = words[at];
      high[n] = words[at + 1];
      count[n++] = counts[at + 2];
    }
    return sorted(low, high, count);
  }

  /** Forgets everything, keeping the memory for the next use. */
  clear(): void {
    this.words.fill(0);
    this.used = 0;
    this.wide = this.whole ? null : new WideBins();
  }

  private addWide(low: number, high: number, cycles: number): void {
    if (this.wide === null) {
      this.wide = new WideBins();
      for (let at = 0; at < this.words.length; at += WORDS) {
        const count = this.counts[at + 2];
        if (count > 0) this.wide.add(this.words[at], this.words[at + 1], count);
      }
      this.words.fill(0);
      this.used = 0;
    }
    this.wide.add(low, high, cycles);
  }

  private grow(): void {
    const { words: oldWords, counts: oldCounts } = this;
    this.slots *= 2;
    this.words = new Int32Array(this.slots * WORDS);
    this.counts = new Uint32Array(this.words.buffer);
    this.used = 0;
    for (let at = 0; at < oldWords.length; at += WORDS) {
      const count = oldCounts[at + 2];
      if (count > 0) this.put(oldWords[at], oldWords[at + 1], count);
    }
  }

  private put(low: number, high: number, count: number): void {
    const mask = this.slots - 1;
    let slot = (Math.imul(low, 0x9e3779b1) ^ Math.imul(high, 0x85ebca6b)) >>> 0;
    slot = (slot ^ (slot >>> 15)) & mask;
    while (this.counts[(slot << 2) + 2] !== 0) slot = (slot + 1) & mask;
    const at = slot << 2;
    this.words[at] = low;
    this.words[at + 1] = high;
    this.counts[at + 2] = count;
    this.used++;
  }
}

/** The same table for any finite doubles. */
class WideBins {
  size = 0;
  private slots = FIRST_SLOTS;
  private low = new Float64Array(FIRST_SLOTS);
  private high = new Float64Array(FIRST_SLOTS);
  private count = new Float64Array(FIRST_SLOTS);
  private readonly bits = new Float64Array(2);
  private readonly hashed = new Int32Array(this.bits.buffer);

  add(low: number, high: number, cycles: number): void {
    const mask = this.slots - 1;
    let slot = this.hash(low, high) & mask;
    while (this.count[slot] !== 0) {
      if (this.low[slot] === low && this.high[slot] === high) {
        this.count[slot] += cycles;
        return;
      }
      slot = (slot + 1) & mask;
    }
    this.low[slot] = low;
    this.high[slot] = high;
    this.count[slot] = cycles;
    if (++this.size * 2 > this.slots) this.grow();
  }

  table(): CycleTable {
    const low = new Float64Array(this.size);
    const high = new Float64Array(this.size);
    const count = new Float64Array(this.size);
    let n = 0;
    for (let slot = 0; slot < this.slots; slot++) {
      if (this.count[slot] === 0) continue;
      low[n] = this.low[slot];
      high[n] = this.high[slot];
      count[n++] = this.count[slot];
    }
    return sorted(low, high, count);
  }

  private hash(low: number, high: number): number {
    // -0 and 0 are one load but two bit patterns.
    this.bits[0] = low + 0;
    this.bits[1] = high + 0;
    let mixed = Math.imul(this.hashed[0] ^ Math.imul(this.hashed[1], 0x27d4eb2f), 0x9e3779b1);
    mixed ^= Math.imul(this.hashed[2] ^ Math.imul(this.hashed[3], 0x165667b1), 0x85ebca6b);
    mixed ^= mixed >>> 15;
    mixed = Math.imul(mixed, 0x2c1b3c6d);
    return (mixed ^ (mixed >>> 13)) >>> 0;
  }

  private grow(): void {
    const { low, high, count, slots } = this;
    this.slots = slots * 2;
    this.low = new Float64Array(this.slots);
    this.high = new Float64Array(this.slots);
    this.count = new Float64Array(this.slots);
    this.size = 0;
    for (let slot = 0; slot < slots; slot++) {
      if (count[slot] > 0) this.add(low[slot], high[slot], count[slot]);
    }
  }
}

/** Sorts by (low, high): first by one typed-array sort of the lows with their places, then within equal lows. */
function sorted(
  low: Int32Array | Float64Array,
  high: Int32Array | Float64Array,
  count: Uint32Array | Float64Array,
): CycleTable {
  const size = low.length;
  const order = new Uint32Array(size);
  for (let i = 0; i < size; i++) order[i] = i;
  order.sort((a, b) => low[a] - low[b] || high[a] - high[b]);
  const table = {
    low: new Float64Array(size),
    high: new Float64Array(size),
    count: new Float64Array(size),
  };
  for (let n = 0; n < size; n++) {
    const i = order[n];
    table.low[n] = low[i] + 0;
    table.high[n] = high[i] + 0;
    table.count[n] = count[i];
  }
  return table;
}
