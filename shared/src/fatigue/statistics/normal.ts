import { lowerRegularisedGamma, upperRegularisedGamma } from './regularised-gamma.js';

/**
 * Standard normal distribution function, the chance of a value below x, accurate to the last digits in both tails.
 * (The one of simple-statistics reads a table of four digits.)
 *
 * @example normalCdf(0) // 0.5
 * Source: Phi(x) = Q(1/2, x^2 / 2) / 2 for x < 0, DLMF 7.11.2 (from memory).
 */
export function normalCdf(x: number): number {
  if (Number.isNaN(x)) return NaN;
  const half = (x * x) / 2;
  return x < 0 ? upperRegularisedGamma(0.5, half) / 2 : 0.5 + lowerRegularisedGamma(0.5, half) / 2;
}

/**
 * Quantile of the standard normal distribution, the inverse of {@link normalCdf}: a rough start, refined by Newton's
 * rule of third order until it stands still. (The probit of simple-statistics has three digits in the tails.)
 *
 * @param probability between 0 and 1; the ends give minus and plus infinity
 * @throws RangeError outside that
 * Source of the start: Abramowitz and Stegun 26.2.23 (from memory).
 */
export function normalQuantile(probability: number): number {
  if (!(probability >= 0 && probability <= 1)) {
    throw new RangeError(`A probability must lie between 0 and 1, not ${probability}.`);
  }
  // Worked in the lower half, where probabilities keep their digits; above one half the mirror image.
  if (probability > 0.5) return -normalQuantile(1 - probability);
  if (probability === 0) return -Infinity;
  let x = -roughUpperQuantile(probability);
  for (let step = 0; step < 8; step++) {
    const newton = ((normalCdf(x) - probability) * Math.sqrt(2 * Math.PI)) / Math.exp((-x * x) / 2);
    const correction = newton / (1 + (x * newton) / 2);
    x -= correction;
    if (Math.abs(correction) <= 1e-15 * Math.max(1, Math.abs(x))) break;
  }
  return x;
}

function roughUpperQuantile(tail: number): number {
  const t = Math.sqrt(-2 * Math.log(tail));
  const numerator = 2.515517 + t * (0.802853 + t * 0.010328);
  const denominator = 1 + t * (1.432788 + t * (0.189269 + t * 0.001308));
  return t - numerator / denominator;
}
