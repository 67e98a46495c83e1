import type { Curve } from '../curves/curve.js';
import { weibullDamage } from './weibull-damage.js';

/**
 * Damage of a narrow-band Gaussian stress: its ranges follow a Rayleigh distribution, a Weibull one of shape 2 and
 * scale 2 * sqrt(2) * standard deviation.
 *
 * @param cycles number of cycles
 * @param standardDeviation of the stress itself, in the measure of the curve
 * Source: closed form in fatigue handbooks, for example DNV-RP-C203 (from memory).
 */
export function rayleighDamage(cycles: number, standardDeviation: number, curve: Curve): number {
  return weibullDamage({ cycles, scale: 2 * Math.SQRT2 * standardDeviation, shape: 2 }, curve);
}
