import type { LoadSpectrum } from './load-spectrum.js';

/** A change of gain and zero: corrected load = gain * load + zero. */
export interface AffineMap {
  /** Factor on the load; above 0. */
  gain: number;
  /** Added after the gain, in load units. */
  zero: number;
}

/**
 * The spectrum of the same history with another gain and zero, without counting again.
 *
 * The grid is kept when the zero is a whole number of the new steps; otherwise the result has no grid (step 0).
 * A negative gain would turn lows into highs, and the days of the highs are not kept for lows: it is refused,
 * the log has to be counted again.
 *
 * @throws RangeError when the gain is not above 0 or a figure is not finite
 */
export function mapAffine(spectrum: LoadSpectrum, { gain, zero }: AffineMap): LoadSpectrum {
  if (!(gain > 0) || !Number.isFinite(gain) || !Number.isFinite(zero)) {
    throw new RangeError(`a gain above 0 and a finite zero are needed, not ${gain} and ${zero}`);
  }
  if (gain === 1 && zero === 0) return spectrum;
  // 15 digits keep a step such as 0.01 * 1.03 a short decimal, so that it finds a common grid with others.
  const step = Number((spectrum.step * gain).toPrecision(15));
  const shift = step > 0 ? zero / step : 0;
  const wholeShift = Math.round(shift);
  const onGrid = step > 0 && Math.abs(shift - wholeShift) <= 1e-9 * Math.max(1, Math.abs(wholeShift));
  const map = onGrid
    ? (level: number) => level + wholeShift
    : (level: number) => gain * (spectrum.step > 0 ? level * spectrum.step : level) + zero;
  return {
    ...spectrum,
    step: onGrid ? step : 0,
    days: spectrum.days.map(({ day, cycles }) => ({
      day,
      cycles: { low: cycles.low.map(map), high: cycles.high.map(map), count: cycles.count },
    })),
    residue: spectrum.residue.map(map),
  };
}
