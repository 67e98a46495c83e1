import { ByteReader } from './byte-reader.js';
import { ByteWriter } from './byte-writer.js';
import { readCycles, writeCycles } from './cycle-codec.js';
import { PackedCursor, TableCursor, writeMerged, type CycleCursor } from './cycle-cursor.js';
import { CycleBins } from './cycle-bins.js';
import type { CycleTable, DayCycles } from './load-spectrum.js';
import { mergeCycleTables } from './merge-cycle-tables.js';
import type { SpectrumParts } from './spectrum-codec.js';

/** Packed tables of one day that are joined when they become this many. */
const MOST_PACKED = 32;
const MOST_SPARES = 2;
const WHOLE = 1;
const RAW = 0;

/** Used for one day after the other. */
const writer = new ByteWriter();

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
  /** Bins of days that are over, for the days to come, the roomiest last. */
  private readonly spares: CycleBins[] = [];
  private binsDay = NaN;
  private recordedDay = NaN;
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
      this.pack(day, bins.view(), bins.isCompact);
      bins.clear();
      this.spares.push(bins);
    }
    this.spares.sort((one, two) => one.room - two.room);
    this.spares.splice(0, this.spares.length - MOST_SPARES);
    this.binsDay = NaN;
    this.recordedDay = recordedDay;
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

  /**
   * All cycles so far as days that write themselves, with late ones added; `null` when one of them is not on whole
   * levels. What is packed stays packed: a season is never unpacked at once.
   */
  packedDays(late: ReadonlyMap<number, CycleTable>): SpectrumParts['days'] | null {
    const days = new Set([...this.packed.keys(), ...this.live.keys(), ...late.keys()]);
    for (const bins of this.live.values()) if (!bins.isCompact) return null;
    for (const { parts } of this.packed.values()) if (parts.some((part) => part[0] !== WHOLE)) return null;
    return [...days]
      .sort((a, b) => a - b)
      .map((day) => ({
        day,
        write: (out) => {
          const parts = this.packed.get(day)?.parts ?? [];
          const bins = this.live.get(day);
          const added = late.get(day);
          if (parts.length === 1 && bins === undefined && added === undefined) {
            out.append(parts[0].subarray(1));
            return;
          }
          const live = bins?.view();
          if (live !== undefined && parts.length === 0 && added === undefined) {
            writeCycles(out, live, true);
            return;
          }
          writeMerged(out, () => {
            const cursors: CycleCursor[] = parts.map((part) => new PackedCursor(readerOf(part, 1)));
            if (live !== undefined) cursors.push(new TableCursor(live));
            if (added !== undefined) cursors.push(new TableCursor(added));
            return cursors;
          });
        },
      }));
  }

  private use(day: number): void {
    let bins = this.live.get(day);
    if (bins === undefined) {
      // The day being recorded gets the roomiest; a cycle that closes late needs little.
      bins =
        (day === this.recordedDay ? this.spares.pop() : this.spares.shift()) ?? new CycleBins(this.whole);
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
    writer.clear();
    writer.byte(whole ? WHOLE : RAW);
    writeCycles(writer, joined, whole);
    known.parts.push(writer.finish());
    known.size += joined.count.length;
  }

  private unpack(part: Uint8Array): CycleTable {
    return readCycles(readerOf(part, 1), part[0] === WHOLE);
  }
}

function readerOf(part: Uint8Array, from: number): ByteReader {
  return new ByteReader(new DataView(part.buffer, part.byteOffset, part.length), from, part.length);
}
