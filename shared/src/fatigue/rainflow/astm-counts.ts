import { cycleTableOf } from './cycle-table.js';
import type { CycleCount } from './cycle-count.js';
import type { CycleTable, LoadSpectrum } from './load-spectrum.js';

/**
 * A spectrum as ASTM E1049-85 section 5.4.4 counts it: closed cycles as 1, neighbouring pairs of the residue
 * as 0.5, added up over equal range and mean, sorted by range and then mean.
 *
 * Equality of range and mean is decided on the levels, before the step is applied, so it is exact. Without a
 * grid two cycles of the same range and mean have the same extremes up to rounding; they are added when range
 * and mean are equal as doubles.
 *
 * Source: ASTM E1049-85 (2017), 5.4.4; the equivalence with closed cycles and residue: McInnes and Meehan,
 * Int. J. Fatigue 30 (2008) 547-559.
 *
 * @returns range, mean in load units
 */
export function astmCounts(spectrum: LoadSpectrum): CycleCount[] {
  const { low, high, count } = withHalfCycles(spectrum);
  const scale = spectrum.step > 0 ? spectrum.step : 1;
  // Range and twice the mean as they stand on the grid: sorting and grouping on these is exact there.
  const range = new Float64Array(low.length);
  const sum = new Float64Array(low.length);
  for (let i = 0; i < low.length; i++) {
    range[i] = high[i] - low[i];
    sum[i] = low[i] + high[i];
  }
  const grouped = cycleTableOf(range, sum, count);
  const counts: CycleCount[] = new Array(grouped.count.length);
  for (let i = 0; i < counts.length; i++) {
    counts[i] = {
      range: grouped.low[i] * scale,
      mean: (grouped.high[i] * scale) / 2,
      count: grouped.count[i],
    };
  }
  return counts;
}

/** All closed cycles of all days, and the residue pairs as half cycles. */
function withHalfCycles(spectrum: LoadSpectrum): CycleTable {
  const { days, residue } = spectrum;
  const pairs = Math.max(0, residue.length - 1);
  let size = pairs;
  for (const { cycles } of days) size += cycles.count.length;
  const low = new Float64Array(size);
  const high = new Float64Array(size);
  const count = new Float64Array(size);
  let at = 0;
  for (const { cycles } of days) {
    low.set(cycles.low, at);
    high.set(cycles.high, at);
    count.set(cycles.count, at);
    at += cycles.count.length;
  }
  for (let i = 0; i < pairs; i++, at++) {
    low[at] = Math.min(residue[i], residue[i + 1]);
    high[at] = Math.max(residue[i], residue[i + 1]);
    count[at] = 0.5;
  }
  return { low, high, count };
}
