import type { CycleTable, DayCycles, LoadSpectrum } from './load-spectrum.js';

/**
 * A spectrum without its ranges below a threshold (hysteresis). To be applied after merging, never before: a
 * small range of one stretch may be part of a large one of the whole.
 *
 * Closed cycles below the threshold go, and so do the ends of the residue whose ranges are below it; the
 * residue grows and then shrinks, so its small ranges stand at its ends.
 *
 * @param spectrum the spectrum
 * @param threshold smallest range kept, in load units; 0 keeps everything
 */
export function dropSmallRanges(spectrum: LoadSpectrum, threshold: number): LoadSpectrum {
  if (!(threshold > 0)) return spectrum;
  const least = inLevels(threshold, spectrum.step);
  const days: DayCycles[] = [];
  for (const { day, cycles } of spectrum.days) {
    const kept = keep(cycles, least);
    if (kept.count.length > 0) days.push({ day, cycles: kept });
  }
  const { residue } = spectrum;
  let from = 0;
  let to = residue.length;
  while (from + 1 < to && Math.abs(residue[from + 1] - residue[from]) < least) from++;
  while (to - 1 > from && Math.abs(residue[to - 1] - residue[to - 2]) < least) to--;
  return {
    ...spectrum,
    days,
    residue: residue.slice(from, to),
    residueDay: spectrum.residueDay.slice(from, to),
  };
}

/** The threshold in the spectrum's own measure; a threshold that is a whole number of steps stays one. */
function inLevels(threshold: number, step: number): number {
  if (step === 0) return threshold;
  const levels = threshold / step;
  const whole = Math.round(levels);
  return Math.abs(levels - whole) <= 1e-9 * whole ? whole : levels;
}

function keep({ low, high, count }: CycleTable, least: number): CycleTable {
  const kept: number[] = [];
  for (let i = 0; i < count.length; i++) if (high[i] - low[i] >= least) kept.push(i);
  const pick = (from: Float64Array) => Float64Array.from(kept, (i) => from[i]);
  return { low: pick(low), high: pick(high), count: pick(count) };
}
