import { damageOfSpectrum } from '../damage/damage-of-spectrum.js';
import type { DetailModel } from '../damage/detail-model.js';
import { spectrumOf } from '../rainflow/spectrum-of.js';
import { decimated } from './decimated.js';

/** Damage of one log counted at its own rate and at fractions of it. */
export interface ThinnedDamage {
  whole: number;
  /** At half the rate over the whole, mean of both ways to take every second sample. 1 for a log without damage. */
  halfOverWhole: number;
  /** At a quarter of the rate over the whole, mean of all four ways. */
  quarterOverWhole: number;
}

/**
 * Counts a log at one half and one quarter of its rate: what the recording itself says about what a lower rate loses.
 * Where half the rate already loses a good part, the full rate loses some too.
 *
 * @param samples loads in kN, evenly spaced
 * @param detail the detail the damage is wanted for
 * @param step grid of the loads, kN; 0 for none
 */
export function thinnedDamage(samples: ArrayLike<number>, detail: DetailModel, step = 0): ThinnedDamage {
  const damageOf = (series: ArrayLike<number>): number =>
    damageOfSpectrum(spectrumOf(series, { step }), detail).damage;
  const meanOf = (by: number): number => {
    let sum = 0;
    for (let start = 0; start < by; start++) sum += damageOf(decimated(samples, by, start));
    return sum / by;
  };
  const whole = damageOf(samples);
  if (whole === 0) return { whole, halfOverWhole: 1, quarterOverWhole: 1 };
  return { whole, halfOverWhole: meanOf(2) / whole, quarterOverWhole: meanOf(4) / whole };
}
