import { emptyCycleTable } from './cycle-table.js';
import type { CycleTable } from './load-spectrum.js';

/**
 * The sum of cycle tables on the same grid. Tables are joined two by two, so that a thousand of them cost
 * about ten passes over their cycles.
 */
export function mergeCycleTables(tables: readonly CycleTable[]): CycleTable {
  let round = tables.filter((table) => table.count.length > 0);
  while (round.length > 1) {
    const next: CycleTable[] = [];
    for (let i = 0; i < round.length; i += 2) {
      next.push(i + 1 < round.length ? mergeTwo(round[i], round[i + 1]) : round[i]);
    }
    round = next;
  }
  return round.length === 0 ? emptyCycleTable() : round[0];
}

/** A table this many times longer than the other is copied in stretches. */
const MUCH_LONGER = 16;

function mergeTwo(one: CycleTable, two: CycleTable): CycleTable {
  if (one.count.length > MUCH_LONGER * two.count.length) return insertFew(one, two);
  if (two.count.length > MUCH_LONGER * one.count.length) return insertFew(two, one);
  const room = one.count.length + two.count.length;
  const low = new Float64Array(room);
  const high = new Float64Array(room);
  const count = new Float64Array(room);
  let i = 0;
  let j = 0;
  let n = 0;
  while (i < one.count.length && j < two.count.length) {
    const order = one.low[i] - two.low[j] || one.high[i] - two.high[j];
    const source = order <= 0 ? one : two;
    const at = order <= 0 ? i : j;
    low[n] = source.low[at];
    high[n] = source.high[at];
    count[n] = source.count[at];
    if (order <= 0) i++;
    else j++;
    if (order === 0) count[n] += two.count[j++];
    n++;
  }
  for (; i < one.count.length; i++, n++) {
    low[n] = one.low[i];
    high[n] = one.high[i];
    count[n] = one.count[i];
  }
  for (; j < two.count.length; j++, n++) {
    low[n] = two.low[j];
    high[n] = two.high[j];
    count[n] = two.count[j];
  }
  return n === room
    ? { low, high, count }
    : { low: low.slice(0, n), high: high.slice(0, n), count: count.slice(0, n) };
}

/** A few cycles put among many: what lies between their places is copied as a whole. */
function insertFew(many: CycleTable, few: CycleTable): CycleTable {
  const room = many.count.length + few.count.length;
  const low = new Float64Array(room);
  const high = new Float64Array(room);
  const count = new Float64Array(room);
  let from = 0;
  let n = 0;
  const copyTo = (to: number) => {
    low.set(many.low.subarray(from, to), n);
    high.set(many.high.subarray(from, to), n);
    count.set(many.count.subarray(from, to), n);
    n += to - from;
    from = to;
  };
  for (let i = 0; i < few.count.length; i++) {
    copyTo(placeOf(many, few.low[i], few.high[i]));
    if (from < many.count.length && many.low[from] === few.low[i] && many.high[from] === few.high[i]) {
      copyTo(from + 1);
      count[n - 1] += few.count[i];
    } else {
      low[n] = few.low[i];
      high[n] = few.high[i];
      count[n++] = few.count[i];
    }
  }
  copyTo(many.count.length);
  return n === room
    ? { low, high, count }
    : { low: low.slice(0, n), high: high.slice(0, n), count: count.slice(0, n) };
}

/** The first place in a table that is not below a pair. */
function placeOf(table: CycleTable, low: number, high: number): number {
  let from = 0;
  let to = table.count.length;
  while (from < to) {
    const middle = (from + to) >> 1;
    const below = table.low[middle] < low || (table.low[middle] === low && table.high[middle] < high);
    if (below) from = middle + 1;
    else to = middle;
  }
  return from;
}
