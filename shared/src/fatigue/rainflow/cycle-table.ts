import type { CycleTable } from './load-spectrum.js';

/** A table without cycles. */
export function emptyCycleTable(): CycleTable {
  return { low: new Float64Array(0), high: new Float64Array(0), count: new Float64Array(0) };
}

/**
 * A cycle table from cycles in any order: sorted by (low, high), equal pairs added up.
 *
 * @param low lower extremes, levels or loads
 * @param high higher extremes, same length
 * @param count whole cycles of each pair; left out: one each
 */
export function cycleTableOf(
  low: ArrayLike<number>,
  high: ArrayLike<number>,
  count?: ArrayLike<number>,
): CycleTable {
  const size = low.length;
  const order = new Uint32Array(size);
  for (let i = 0; i < size; i++) order[i] = i;
  order.sort((a, b) => low[a] - low[b] || high[a] - high[b]);
  const outLow = new Float64Array(size);
  const outHigh = new Float64Array(size);
  const outCount = new Float64Array(size);
  let n = 0;
  for (const i of order) {
    const cycles = count === undefined ? 1 : count[i];
    if (n > 0 && outLow[n - 1] === low[i] && outHigh[n - 1] === high[i]) {
      outCount[n - 1] += cycles;
    } else {
      // Adding zero turns -0 into 0, so that equal tables have equal bytes.
      outLow[n] = low[i] + 0;
      outHigh[n] = high[i] + 0;
      outCount[n] = cycles;
      n++;
    }
  }
  return n === size
    ? { low: outLow, high: outHigh, count: outCount }
    : { low: outLow.slice(0, n), high: outHigh.slice(0, n), count: outCount.slice(0, n) };
}
