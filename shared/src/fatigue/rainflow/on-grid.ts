import type { LoadSpectrum } from './load-spectrum.js';

/**
 * The same spectrum written on a finer grid that holds all its levels, or on none (step 0).
 *
 * @param spectrum the spectrum
 * @param step grid in load units; the spectrum's own step must be a whole multiple of it, or it must be 0
 * @throws RangeError when the grid does not hold the spectrum's levels
 */
export function onGrid(spectrum: LoadSpectrum, step: number): LoadSpectrum {
  if (step === spectrum.step) return spectrum;
  const ratio = step === 0 ? spectrum.step : Math.round(spectrum.step / step);
  const holds = spectrum.step !== 0 && (step === 0 || Math.abs(spectrum.step / step - ratio) <= 1e-9 * ratio);
  if (!holds)
    throw new RangeError(`a grid of ${step} does not hold the levels of a grid of ${spectrum.step}`);
  // A product of a level and a step is the load as everywhere else: level * step, rounded once.
  const scaled = (levels: Float64Array) => levels.map((level) => level * ratio);
  return {
    ...spectrum,
    step,
    days: spectrum.days.map(({ day, cycles }) => ({
      day,
      cycles: { low: scaled(cycles.low), high: scaled(cycles.high), count: cycles.count },
    })),
    residue: scaled(spectrum.residue),
  };
}
