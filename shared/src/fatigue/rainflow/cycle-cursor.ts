import type { ByteReader } from './byte-reader.js';
import { CycleWriter } from './cycle-codec.js';
import type { ByteWriter } from './byte-writer.js';
import type { CycleTable } from './load-spectrum.js';

/** Cycles in ascending order of (low, high), one at a time. */
export interface CycleCursor {
  low: number;
  high: number;
  count: number;
  /** Goes to the next cycle. @returns false when there is none */
  next(): boolean;
}

/** The cycles of a table, one at a time. */
export class TableCursor implements CycleCursor {
  low = 0;
  high = 0;
  count = 0;
  private at = 0;

  constructor(private readonly table: CycleTable) {}

  next(): boolean {
    const { low, high, count } = this.table;
    if (this.at >= count.length) return false;
    this.low = low[this.at];
    this.high = high[this.at];
    this.count = count[this.at++];
    return true;
  }
}

/** The cycles written by `writeCycles` on whole levels, one at a time. */
export class PackedCursor implements CycleCursor {
  low = 0;
  high = 0;
  count = 0;
  private left: number;
  private begun = false;

  constructor(private readonly input: ByteReader) {
    this.left = input.whole();
  }

  next(): boolean {
    if (this.left === 0) return false;
    this.left--;
    const growth = this.begun ? this.input.whole() : this.input.signed();
    const sameLow = this.begun && growth === 0;
    this.begun = true;
    this.low += growth;
    this.high = this.input.whole() + (sameLow ? this.high : this.low);
    this.count = this.input.whole();
    return true;
  }
}

/**
 * Writes the sum of several cursors as `writeCycles` would write their merged table, without making the table.
 *
 * @param cursors makes them; asked twice, because the number of cycles is written first
 */
export function writeMerged(out: ByteWriter, cursors: () => CycleCursor[]): void {
  let size = 0;
  forEachMerged(cursors(), () => size++);
  const writer = new CycleWriter(out, size, true);
  forEachMerged(cursors(), (low, high, count) => writer.write(low, high, count));
}

function forEachMerged(
  cursors: CycleCursor[],
  visit: (low: number, high: number, count: number) => void,
): void {
  let open = cursors.filter((cursor) => cursor.next());
  while (open.length > 0) {
    let least = open[0];
    for (const cursor of open) {
      if (cursor.low < least.low || (cursor.low === least.low && cursor.high < least.high)) least = cursor;
    }
    const { low, high } = least;
    let count = 0;
    let ended = false;
    for (const cursor of open) {
      if (cursor.low !== low || cursor.high !== high) continue;
      count += cursor.count;
      if (!cursor.next()) {
        cursor.count = 0;
        ended = true;
      }
    }
    visit(low, high, count);
    if (ended) open = open.filter((cursor) => cursor.count > 0);
  }
}
