import { cycleTableOf } from './cycle-table.js';
import type { CycleTable } from './load-spectrum.js';

/** Cycles given one by one, as one table for each day. */
export function tablesByDay(cycles: {
  low: number[];
  high: number[];
  day: number[];
}): Map<number, CycleTable> {
  const members = new Map<number, number[]>();
  cycles.day.forEach((day, i) => {
    const known = members.get(day);
    if (known === undefined) members.set(day, [i]);
    else known.push(i);
  });
  const tables = new Map<number, CycleTable>();
  for (const [day, places] of members) {
    const low = places.map((i) => cycles.low[i]);
    const high = places.map((i) => cycles.high[i]);
    tables.set(day, cycleTableOf(low, high));
  }
  return tables;
}
