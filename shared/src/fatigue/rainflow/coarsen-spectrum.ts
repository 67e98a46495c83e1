import { cycleTableOf } from './cycle-table.js';
import { levelOf } from './level-of.js';
import type { LoadSpectrum } from './load-spectrum.js';
import { mergeAll } from './merge-spectra.js';

/**
 * The spectrum of the same history with its loads rounded to a coarser grid. Rounding keeps the order of loads,
 * so the result is the exact count of the rounded history; cycles whose extremes round to the same level are
 * gone. The number of turning points stays that of the unrounded history, which is not known any more.
 *
 * @param spectrum the spectrum
 * @param step new grid in load units, above 0
 */
export function coarsenSpectrum(spectrum: LoadSpectrum, step: number): LoadSpectrum {
  const scale = spectrum.step > 0 ? spectrum.step : 1;
  const level = (value: number) => levelOf(value * scale, step) + 0;
  const days: LoadSpectrum['days'] = [];
  for (const { day, cycles } of spectrum.days) {
    const low: number[] = [];
    const high: number[] = [];
    const count: number[] = [];
    for (let i = 0; i < cycles.count.length; i++) {
      const lowLevel = level(cycles.low[i]);
      const highLevel = level(cycles.high[i]);
      if (lowLevel === highLevel) continue;
      low.push(lowLevel);
      high.push(highLevel);
      count.push(cycles.count[i]);
    }
    if (low.length > 0) days.push({ day, cycles: cycleTableOf(low, high, count) });
  }
  const cycles: LoadSpectrum = {
    step,
    days,
    residue: new Float64Array(0),
    residueDay: new Int32Array(0),
    samples: spectrum.samples,
    turningPoints: 0,
  };
  const residue: LoadSpectrum = {
    step,
    days: [],
    residue: spectrum.residue.map(level),
    residueDay: spectrum.residueDay,
    samples: 0,
    turningPoints: 0,
  };
  return { ...mergeAll([cycles, residue]), turningPoints: spectrum.turningPoints };
}
