import { normalCdf, normalQuantile } from './normal.js';

/** A part that uses up its life evenly, with all its doubts lognormal and independent. */
export interface FailureModel {
  /** Median damage per year, on the mean curve. */
  medianDamagePerYear: number;
  /** Median of the Miner sum at which it fails. */
  medianMinerSum: number;
  /** Standard deviation of the natural logarithm of everything together; see {@link totalLnSd}. */
  totalLnSd: number;
}

/** Root of the sum of squares: the spread of a product of independent lognormal quantities. */
export function totalLnSd(...lnSds: number[]): number {
  return Math.hypot(...lnSds);
}

/**
 * Chance of having failed after so many years: Phi((ln(years * damage per year) - ln(median Miner sum)) / spread).
 *
 * @param years zero or more
 * Source: lognormal format of the JCSS Probabilistic Model Code, part 3 (published); closed form derived.
 */
export function failureProbability(model: FailureModel, years: number): number {
  return normalCdf(Math.log((years * model.medianDamagePerYear) / model.medianMinerSum) / model.totalLnSd);
}

/**
 * Years after which the chance of having failed reaches a level, the inverse of {@link failureProbability}.
 *
 * @param probability between 0 and 1
 */
export function yearsToProbability(model: FailureModel, probability: number): number {
  return (
    (model.medianMinerSum / model.medianDamagePerYear) *
    Math.exp(normalQuantile(probability) * model.totalLnSd)
  );
}

/**
 * Chance of failing between two ages of a part that was sound at the first:
 * (P(to) - P(from)) / (1 - P(from)).
 *
 * @param fromYears age at which it was sound
 * @param toYears later age
 */
export function conditionalFailureProbability(
  model: FailureModel,
  fromYears: number,
  toYears: number,
): number {
  const before = failureProbability(model, fromYears);
  return (failureProbability(model, toYears) - before) / (1 - before);
}
