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
  const order = sortedOrder(low, high);
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

/**
 * The places of pairs in ascending order of the first and then the second. Whole numbers are packed together with
 * their place into one double: typed arrays sort numbers many times faster than by a function.
 */
export function sortedOrder(first: ArrayLike<number>, second: ArrayLike<number>): Uint32Array {
  const size = first.length;
  const order = new Uint32Array(size);
  for (let i = 0; i < size; i++) order[i] = i;
  let leastFirst = Infinity;
  let leastSecond = Infinity;
  let greatestFirst = -Infinity;
  let greatestSecond = -Infinity;
  let whole = true;
  for (let i = 0; whole && i < size; i++) {
    const a = first[i];
    const b = second[i];
    if (a < leastFirst) leastFirst = a;
    if (a > greatestFirst) greatestFirst = a;
    if (b < leastSecond) leastSecond = b;
    if (b > greatestSecond) greatestSecond = b;
    whole = Math.floor(a) === a && Math.floor(b) === b;
  }
  const span = greatestSecond - leastSecond + 1;
  const room = (greatestFirst - leastFirst + 1) * span * size;
  if (!whole || !(room <= Number.MAX_SAFE_INTEGER)) {
    return order.sort((a, b) => first[a] - first[b] || second[a] - second[b]);
  }
  const packed = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    packed[i] = ((first[i] - leastFirst) * span + (second[i] - leastSecond)) * size + i;
  }
  packed.sort();
  // Division and subtraction: the remainder of doubles this large is slow.
  for (let i = 0; i < size; i++) order[i] = packed[i] - Math.floor(packed[i] / size) * size;
  return order;
}
