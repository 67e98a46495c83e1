import { gammaln } from 'simple-statistics';
import { normalCdf, normalQuantile } from './normal.js';

const INTERVALS = 2000;

/**
 * One-sided tolerance factor k: with the stated confidence, mean - k * standard deviation of so many tests lies below
 * what the stated share of the population survives. It is the quantile of a non-central t distribution over sqrt(n).
 *
 * @param tests number of tests, 2 or more
 * @param survival share of the population, between 0.5 and 1
 * @param confidence between 0 and 1
 * @returns k, to about six digits
 * @throws RangeError outside those bounds
 * @example toleranceFactor(10, 0.95, 0.75) // 2.104
 */
export function toleranceFactor(tests: number, survival: number, confidence: number): number {
  if (!(Number.isInteger(tests) && tests >= 2))
    throw new RangeError(`Two tests or more are needed, not ${tests}.`);
  if (!(survival >= 0.5 && survival < 1))
    throw new RangeError(`The share must lie between 0.5 and 1, not ${survival}.`);
  if (!(confidence > 0 && confidence < 1)) {
    throw new RangeError(`The confidence must lie between 0 and 1, not ${confidence}.`);
  }
  const root = Math.sqrt(tests);
  const shift = normalQuantile(survival) * root;
  let low = -10;
  let high = 1;
  while (nonCentralTCdf(high * root, tests - 1, shift) < confidence) high *= 2;
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2;
    if (nonCentralTCdf(middle * root, tests - 1, shift) < confidence) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** The mean over w = sqrt(chi-square / freedom) of Phi(t * w - shift), by Simpson's rule. */
function nonCentralTCdf(t: number, freedom: number, shift: number): number {
  // w has mean about 1 and standard deviation about 1 / sqrt(2 * freedom); twelve of them leave nothing outside.
  const upper = 1 + 12 / Math.sqrt(2 * freedom);
  const width = upper / INTERVALS;
  const lnConstant = Math.LN2 + (freedom / 2) * Math.log(freedom / 2) - gammaln(freedom / 2);
  let sum = 0;
  for (let i = 0; i <= INTERVALS; i++) {
    const w = i * width;
    const density =
      w === 0
        ? freedom === 1
          ? Math.exp(lnConstant)
          : 0
        : Math.exp(lnConstant + (freedom - 1) * Math.log(w) - (freedom * w * w) / 2);
    const weight = i === 0 || i === INTERVALS ? 1 : i % 2 === 1 ? 4 : 2;
    sum += weight * density * normalCdf(t * w - shift);
  }
  return (sum * width) / 3;
}
