import type { LoadSpectrum } from './load-spectrum.js';
import { RainflowCounter } from './rainflow-counter.js';

/**
 * The load spectrum of samples in memory.
 *
 * @param loads samples in time order, any unit; NaN is a missing sample
 * @param options.step grid in the same unit the loads are rounded to; 0 or left out: exact
 * @param options.day day of all samples, or of each of them; left out: 0
 */
export function spectrumOf(
  loads: ArrayLike<number>,
  options: { step?: number; day?: number | ArrayLike<number> } = {},
): LoadSpectrum {
  const { step = 0, day = 0 } = options;
  const counter = new RainflowCounter({ step });
  const block = Float64Array.from(loads);
  if (typeof day === 'number') {
    counter.push(block, block.length, day);
    return counter.spectrum();
  }
  let from = 0;
  while (from < block.length) {
    let to = from + 1;
    while (to < block.length && day[to] === day[from]) to++;
    counter.push(block.subarray(from, to), to - from, day[from]);
    from = to;
  }
  return counter.spectrum();
}
