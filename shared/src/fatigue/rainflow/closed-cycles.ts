import { ByteReader } from './byte-reader.js';
import { ByteWriter } from './byte-writer.js';
import { readCycles, writeCycles } from './cycle-codec.js';
import { CycleBins } from './cycle-bins.js';
import type { CycleTable, DayCycles } from './load-spectrum.js';
import { mergeCycleTables } from './merge-cycle-tables.js';

/** Packed tables of one day that are joined when they become this many. */
const MOST_PACKED = 32;
const WHOLE = 1;
const RAW = 0;

/** Cycles of a day that is over, in a few bytes each. */
interface PackedDay {
  parts: Uint8Array[];
  /** Distinct pairs in them. */
  size: number;
}

/**
 * The closed cycles of a history being counted, by day. The day being counted is kept in bins; when the next one
 * begins, it is packed into a few bytes a cycle, so that a season takes little more memory than a day.
 */
export class ClosedCycles {
  private readonly live = new Map<number, CycleBins>();
  private readonly packed = new Map<number, PackedDay>();
  private spare: CycleBins | null = null;
  private binsDay = NaN;
  private bins: CycleBins;

  /** @param whole whether extremes are whole levels; false: raw loads */
  constructor(private readonly whole: boolean) {
    this.bins = new CycleBins(whole);
  }

  /** What memory grows with: distinct cycles, those of the days in progress with the room taken for them. */
  get held(): number {
    let held = 0;
    for (const bins of this.live.values()) held += bins.held;
    for (const { size } of this.packed.values()) held += size;
    return held;
  }

  /** Adds one closed cycle whose higher extreme fell on `day`. */
  add(day: number, low: number, high: number): void {
    if (day !== this.binsDay) this.use(day);
    this.bins.add(low, high);
  }

  /** Packs all days but the one now being recorded. */
  packOther(recordedDay: number): void {
    for (const [day, bins] of this.live) {
      if (day === recordedDay) continue;
      this.live.delete(day);
      this.pack(day, bins.table(), bins.isCompact);
      bins.clear();
      this.spare = bins;
    }
    this.binsDay = NaN;
  }

  /** All cycles so far, days ascending. */
  days(): DayCycles[] {
    const days = new Set([...this.packed.keys(), ...this.live.keys()]);
    return [...days]
      .sort((a, b) => a - b)
      .map((day) => {
        const tables = (this.packed.get(day)?.parts ?? []).map((part) => this.unpack(part));
        const bins = this.live.get(day);
        if (bins !== undefined) tables.push(bins.table());
        return { day, cycles: mergeCycleTables(tables) };
      });
  }

  private use(day: number): void {
    let bins = this.live.get(day);
    if (bins === undefined) {
      bins = this.spare ?? new CycleBins(this.whole);
      this.spare = null;
      this.live.set(day, bins);
    }
    this.binsDay = day;
    this.bins = bins;
  }

  private pack(day: number, table: CycleTable, isCompact: boolean): void {
    let known = this.packed.get(day);
    if (known === undefined) {
      known = { parts: [], size: 0 };
      this.packed.set(day, known);
    }
    let joined = table;
    let whole = isCompact;
    if (known.parts.length >= MOST_PACKED) {
      whole = whole && known.parts.every((part) => part[0] === WHOLE);
      joined = mergeCycleTables([...known.parts.map((part) => this.unpack(part)), table]);
      known.parts = [];
      known.size = 0;
    }
    const writer = new ByteWriter();
    writer.byte(whole ? WHOLE : RAW);
    writeCycles(writer, joined, whole);
    known.parts.push(writer.finish());
    known.size += joined.count.length;
  }

  private unpack(part: Uint8Array): CycleTable {
    const reader = new ByteReader(new DataView(part.buffer, part.byteOffset, part.length), 0, part.length);
    return readCycles(reader, reader.byte() === WHOLE);
  }
}
