import { gamma } from 'simple-statistics';
import { lowerRegularisedGamma } from './regularised-gamma.js';

/** Inputs of the class-society form of the Weibull damage. */
export interface ClassRuleInput {
  cycles: number;
  /** Intercept a of the curve above its knee (N = a * range^-m). */
  intercept: number;
  m: number;
  /** By how much the slope grows below the knee, 2 in the rules. */
  slopeChange: number;
  shape: number;
  /** Range exceeded once in `exceededOnceIn` cycles, MPa. */
  referenceRangeMpa: number;
  exceededOnceIn: number;
  /** Range at the knee of the curve, MPa. */
  kneeRangeMpa: number;
}

/** Damage with the two intermediate values of the rules. */
export interface ClassRuleDamage {
  /** Knee in the scale of the distribution. */
  nu: number;
  /** Factor for the change of slope, 1 for none. */
  mu: number;
  damage: number;
}

/**
 * Weibull damage in the form of class-society rules: a one-slope damage times a factor mu for the change of slope at
 * the knee. The same mathematics as weibullDamage on two segments, written down independently.
 *
 * Source: class-society common structural rules, fatigue section (secondary).
 */
export function classRuleDamage(input: ClassRuleInput): ClassRuleDamage {
  const { cycles, intercept, m, slopeChange, shape, referenceRangeMpa, exceededOnceIn, kneeRangeMpa } = input;
  const lnExceeded = Math.log(exceededOnceIn);
  const nu = (kneeRangeMpa / referenceRangeMpa) ** shape * lnExceeded;
  const order = 1 + m / shape;
  const lower = 1 + (m + slopeChange) / shape;
  const partBelow = (a: number): number => lowerRegularisedGamma(a, nu) * gamma(a);
  const mu = 1 - (partBelow(order) - nu ** (-slopeChange / shape) * partBelow(lower)) / gamma(order);
  const oneSlope = ((cycles / intercept) * referenceRangeMpa ** m * gamma(order)) / lnExceeded ** (m / shape);
  return { nu, mu, damage: oneSlope * mu };
}
