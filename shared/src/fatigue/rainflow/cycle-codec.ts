import type { ByteReader } from './byte-reader.js';
import type { ByteWriter } from './byte-writer.js';
import type { CycleTable } from './load-spectrum.js';

/** Writes a cycle table: whole levels as differences, raw loads as doubles. */
export function writeCycles(out: ByteWriter, { low, high, count }: CycleTable, whole: boolean): void {
  const size = count.length;
  out.whole(size);
  let previousLow = 0;
  let previousHigh = 0;
  for (let i = 0; i < size; i++) {
    if (whole) {
      if (i === 0) out.signed(low[i]);
      else out.whole(low[i] - previousLow);
      out.whole(i > 0 && low[i] === previousLow ? high[i] - previousHigh : high[i] - low[i]);
    } else {
      out.double(low[i]);
      out.double(high[i]);
    }
    out.whole(count[i]);
    previousLow = low[i];
    previousHigh = high[i];
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
