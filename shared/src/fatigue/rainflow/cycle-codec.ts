import type { ByteReader } from './byte-reader.js';
import type { ByteWriter } from './byte-writer.js';
import type { CycleTable } from './load-spectrum.js';

/** Writes a cycle table: whole levels as differences, raw loads as doubles. */
export function writeCycles(out: ByteWriter, { low, high, count }: CycleTable, whole: boolean): void {
  const writer = new CycleWriter(out, count.length, whole);
  for (let i = 0; i < count.length; i++) writer.write(low[i], high[i], count[i]);
}

/** Writes cycles one after the other, in ascending order. */
export class CycleWriter {
  private begun = false;
  private previousLow = 0;
  private previousHigh = 0;

  /** @param size how many cycles will be written */
  constructor(
    private readonly out: ByteWriter,
    size: number,
    private readonly whole: boolean,
  ) {
    out.whole(size);
  }

  /** Writes the next cycle. */
  write(low: number, high: number, count: number): void {
    const { out, begun, previousLow } = this;
    if (this.whole) {
      if (begun) out.whole(low - previousLow);
      else out.signed(low);
      out.whole(begun && low === previousLow ? high - this.previousHigh : high - low);
    } else {
      out.double(low);
      out.double(high);
    }
    out.whole(count);
    this.begun = true;
    this.previousLow = low;
    this.previousHigh = high;
  }
}

/** Reads what `writeCycles` wrote. */
export function readCycles(input: ByteReader, whole: boolean): CycleTable {
  const size = input.length(whole ? 3 : 17);
  const low = new Float64Array(size);
  const high = new Float64Array(size);
  const count = new Float64Array(size);
  let previousLow = 0;
  let previousHigh = 0;
  for (let i = 0; i < size; i++) {
    if (whole) {
      const growth = i === 0 ? input.signed() : input.whole();
      const sameLow = i > 0 && growth === 0;
      previousLow = previousLow + growth;
      previousHigh = input.whole() + (sameLow ? previousHigh : previousLow);
    } else {
      previousLow = input.double();
      previousHigh = input.double();
    }
    low[i] = previousLow;
    high[i] = previousHigh;
    count[i] = input.whole();
    const ordered = i === 0 || low[i] > low[i - 1] || (low[i] === low[i - 1] && high[i] > high[i - 1]);
    if (!ordered || !(high[i] > low[i])) input.fail('cycles out of order');
  }
  return { low, high, count };
}
