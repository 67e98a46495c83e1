import { emptyCycleTable, sortedOrder } from './cycle-table.js';
import type { CycleTable } from './load-spectrum.js';

/** A tile is 4 by 4 bins: its counts are one cache line. */
const TILE_BITS = 2;
const TILE_MASK = (1 << TILE_BITS) - 1;
const TILE_BINS = 1 << (2 * TILE_BITS);
const FIRST_SLOTS = 256;
/** Widest span of tiles that is sorted by counting instead of comparing. */
const WIDEST_COUNTING_SORT = 1 << 16;
/** Counts above this move to the table of doubles before they could run over. */
const LARGEST_COUNT = 0xfffffff0;

/**
 * Closed cycles being counted: from (low, high) to a number of cycles.
 *
 * Whole levels, the usual case, are kept in tiles of 4 by 4 neighbouring bins behind a hash table of the tiles.
 * Cycles of one history lie close together, so the tables stay small enough for the nearer caches, where a hash
 * table of single bins does not. The first extreme that is no 32-bit whole number moves everything into a plain
 * hash table of doubles.
 */
export class CycleBins {
  private slots = FIRST_SLOTS;
  /** Two words a slot: the tile's low and high, in tiles. */
  private keys = new Int32Array(FIRST_SLOTS * 2);
  /** Place of the slot's tile in `counts`, plus one; 0: empty. */
  private places = new Int32Array(FIRST_SLOTS);
  private counts = new Uint32Array((FIRST_SLOTS / 2) * TILE_BINS);
  private tiles = 0;
  private wide: WideBins | null;

  /** @param whole whether the extremes are whole levels; false: raw loads */
  constructor(private readonly whole: boolean) {
    this.wide = whole ? null : new WideBins();
  }

  /** What memory grows with: room for this many distinct (low, high) pairs is taken. */
  get held(): number {
    return this.wide === null ? this.tiles * TILE_BINS : this.wide.size;
  }

  /** How much it holds before it grows. */
  get room(): number {
    return this.slots;
  }

  /** Whether all extremes so far are 32-bit whole numbers. */
  get isCompact(): boolean {
    return this.wide === null;
  }

  /** Adds one cycle between two extremes. */
  add(low: number, high: number): void {
    const lowWord = low | 0;
    const highWord = high | 0;
    if (this.wide !== null || lowWord !== low || highWord !== high) {
      this.widen().add(low, high, 1);
      return;
    }
    const tileLow = lowWord >> TILE_BITS;
    const tileHigh = highWord >> TILE_BITS;
    const { keys, places } = this;
    const mask = this.slots - 1;
    let slot = hashOf(tileLow, tileHigh) & mask;
    let place = places[slot];
    while (place !== 0 && (keys[slot * 2] !== tileLow || keys[slot * 2 + 1] !== tileHigh)) {
      slot = (slot + 1) & mask;
      place = places[slot];
    }
    if (place === 0) place = this.newTile(slot, tileLow, tileHigh);
    const bin = (place - 1) * TILE_BINS + ((lowWord & TILE_MASK) << TILE_BITS) + (highWord & TILE_MASK);
    if (++this.counts[bin] > LARGEST_COUNT) this.widen();
  }

  /** The cycles counted so far, sorted. */
  table(): CycleTable {
    const { low, high, count } = this.view();
    return { low: low.slice(), high: high.slice(), count: count.slice() };
  }

  /**
   * The same without copying, in memory that is used again by the next call on any bins: a day's cycles are looked
   * at once to be packed, and memory taken for that each time would pile up faster than it is collected.
   */
  view(): CycleTable {
    if (this.wide !== null) return this.wide.table();
    const { counts, tiles } = this;
    let size = 0;
    for (let bin = 0; bin < tiles * TILE_BINS; bin++) size += isAboveZero(counts[bin]);
    if (size === 0) return emptyCycleTable();
    // One more than needed: every bin is written, and only a filled one is stepped past. A branch on whether a bin
    // is filled would be guessed wrong too often.
    if (size + 1 > scratch.low.length) scratch = emptyTableOf(size * 2);
    const { low, high, count } = scratch;
    const { keys, places } = this;
    const order = this.sortedSlots();
    let n = 0;
    let from = 0;
    // Tiles of one row of tiles stand together; each of their four lows runs through all of them.
    while (from < order.length) {
      const tileLow = keys[order[from] * 2];
      let to = from + 1;
      while (to < order.length && keys[order[to] * 2] === tileLow) to++;
      for (let row = 0; row <= TILE_MASK; row++) {
        for (let i = from; i < to; i++) {
          const first = (places[order[i]] - 1) * TILE_BINS + (row << TILE_BITS);
          const highs = keys[order[i] * 2 + 1] << TILE_BITS;
          for (let column = 0; column <= TILE_MASK; column++) {
            const cycles = counts[first + column];
            low[n] = (tileLow << TILE_BITS) + row;
            high[n] = highs + column;
            count[n] = cycles;
            n += isAboveZero(cycles);
          }
        }
      }
      from = to;
    }
    return { low: low.subarray(0, size), high: high.subarray(0, size), count: count.subarray(0, size) };
  }

  /** Forgets everything, keeping the memory for the next use. */
  clear(): void {
    this.places.fill(0);
    this.counts.fill(0, 0, this.tiles * TILE_BINS);
    this.tiles = 0;
    this.wide = this.whole ? null : new WideBins();
  }

  private forEach(visit: (low: number, high: number, cycles: number) => void): void {
    const { keys, places, counts } = this;
    for (let slot = 0; slot < this.slots; slot++) {
      if (places[slot] === 0) continue;
      const low = keys[slot * 2] << TILE_BITS;
      const high = keys[slot * 2 + 1] << TILE_BITS;
      const first = (places[slot] - 1) * TILE_BINS;
      for (let bin = 0; bin < TILE_BINS; bin++) {
        const cycles = counts[first + bin];
        if (cycles > 0) visit(low + (bin >> TILE_BITS), high + (bin & TILE_MASK), cycles);
      }
    }
  }

  /** The slots in use, by the tile's low and then its high. */
  private sortedSlots(): Int32Array {
    const { keys, places, slots, tiles } = this;
    if (tiles > slotScratch[0].length) slotScratch = [new Int32Array(tiles * 2), new Int32Array(tiles * 2)];
    const used = slotScratch[0].subarray(0, tiles);
    const other = slotScratch[1].subarray(0, tiles);
    let n = 0;
    for (let slot = 0; slot < slots; slot++) if (places[slot] !== 0) used[n++] = slot;
    let lowest = keys[used[0] * 2];
    let greatestLow = lowest;
    let leastHigh = keys[used[0] * 2 + 1];
    let highest = leastHigh;
    for (let i = 1; i < tiles; i++) {
      const low = keys[used[i] * 2];
      const high = keys[used[i] * 2 + 1];
      if (low < lowest) lowest = low;
      if (low > greatestLow) greatestLow = low;
      if (high < leastHigh) leastHigh = high;
      if (high > highest) highest = high;
    }
    if (greatestLow - lowest > WIDEST_COUNTING_SORT || highest - leastHigh > WIDEST_COUNTING_SORT) {
      return used.sort((a, b) => keys[a * 2] - keys[b * 2] || keys[a * 2 + 1] - keys[b * 2 + 1]);
    }
    countingSort(used, other, keys, 1, leastHigh, highest);
    countingSort(other, used, keys, 0, lowest, greatestLow);
    return used;
  }

  private newTile(slot: number, tileLow: number, tileHigh: number): number {
    this.keys[slot * 2] = tileLow;
    this.keys[slot * 2 + 1] = tileHigh;
    const place = ++this.tiles;
    this.places[slot] = place;
    if (this.tiles * 2 >= this.slots) this.grow();
    return place;
  }

  private grow(): void {
    const { keys, places, slots } = this;
    this.slots = slots * 2;
    this.keys = new Int32Array(this.slots * 2);
    this.places = new Int32Array(this.slots);
    const counts = new Uint32Array((this.slots / 2) * TILE_BINS);
    counts.set(this.counts);
    this.counts = counts;
    const mask = this.slots - 1;
    for (let old = 0; old < slots; old++) {
      if (places[old] === 0) continue;
      let slot = hashOf(keys[old * 2], keys[old * 2 + 1]) & mask;
      while (this.places[slot] !== 0) slot = (slot + 1) & mask;
      this.keys[slot * 2] = keys[old * 2];
      this.keys[slot * 2 + 1] = keys[old * 2 + 1];
      this.places[slot] = places[old];
    }
  }

  /** Goes over to the table of doubles. */
  private widen(): WideBins {
    if (this.wide !== null) return this.wide;
    const wide = new WideBins();
    this.forEach((low, high, cycles) => wide.add(low, high, cycles));
    this.clear();
    this.wide = wide;
    return wide;
  }
}

let scratch = emptyTableOf(1024);
let slotScratch = [new Int32Array(1024), new Int32Array(1024)];

function emptyTableOf(size: number): CycleTable {
  return { low: new Float64Array(size), high: new Float64Array(size), count: new Float64Array(size) };
}

/** 1 for a count above 0, without a branch: the sign of the negated halves. */
function isAboveZero(count: number): number {
  return (0 - (count >>> 1) - (count & 1)) >>> 31;
}

/** Orders slots by one word of their keys, between the smallest and the largest of them; equal ones keep their order. */
function countingSort(
  slots: Int32Array,
  sorted: Int32Array,
  keys: Int32Array,
  word: number,
  smallest: number,
  largest: number,
): void {
  const starts = new Int32Array(largest - smallest + 2);
  for (let i = 0; i < slots.length; i++) starts[keys[slots[i] * 2 + word] - smallest + 1]++;
  for (let i = 1; i < starts.length; i++) starts[i] += starts[i - 1];
  for (let i = 0; i < slots.length; i++) {
    const slot = slots[i];
    sorted[starts[keys[slot * 2 + word] - smallest]++] = slot;
  }
}

/** Multiplicative hash: the high bits of the product depend on all bits of both. */
function hashOf(tileLow: number, tileHigh: number): number {
  const mixed = Math.imul(Math.imul(tileLow, 0x85ebca6b) + tileHigh, 0x9e3779b1);
  return mixed ^ (mixed >>> 16);
}

/** From any two finite doubles to a number of cycles. */
class WideBins {
  size = 0;
  private slots = 1024;
  private low = new Float64Array(1024);
  private high = new Float64Array(1024);
  private count = new Float64Array(1024);
  private readonly bits = new Float64Array(2);
  private readonly words = new Int32Array(this.bits.buffer);

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
    return sortedTable(low, high, count);
  }

  private hash(low: number, high: number): number {
    // -0 and 0 are one load but two bit patterns.
    this.bits[0] = low + 0;
    this.bits[1] = high + 0;
    let mixed = Math.imul(this.words[0] ^ Math.imul(this.words[1], 0x27d4eb2f), 0x9e3779b1);
    mixed ^= Math.imul(this.words[2] ^ Math.imul(this.words[3], 0x165667b1), 0x85ebca6b);
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

/** Distinct cycles in any order, sorted by (low, high). */
function sortedTable(low: Float64Array, high: Float64Array, count: Float64Array): CycleTable {
  const size = low.length;
  const order = sortedOrder(low, high);
  const table = { low: new Float64Array(size), high: new Float64Array(size), count: new Float64Array(size) };
  for (let n = 0; n < size; n++) {
    const i = order[n];
    table.low[n] = low[i] + 0;
    table.high[n] = high[i] + 0;
    table.count[n] = count[i];
  }
  return table;
}
