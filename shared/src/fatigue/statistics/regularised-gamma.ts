import { gammaln } from 'simple-statistics';

const MAX_TERMS = 10_000;
const EPSILON = 2 ** -53;

/**
 * Regularised lower incomplete gamma function P(a, x) = integral from 0 to x of t^(a-1) e^-t dt, over Gamma(a).
 * Series for x < a + 1, continued fraction otherwise; at least 12 digits for a up to some thousands.
 *
 * The logarithm of the gamma function comes from simple-statistics, whose gammaln agrees with the exact value to 15
 * digits; that package has no incomplete gamma function.
 *
 * @param a shape, above zero
 * @param x zero or more
 * @throws RangeError outside that
 * @example lowerRegularisedGamma(1, 1) // 1 - 1/e
 * Source: DLMF 8.7.1 (series) and 8.9.2 (continued fraction), from memory.
 */
export function lowerRegularisedGamma(a: number, x: number): number {
  requireDomain(a, x);
  return x < a + 1 ? lowerBySeries(a, x) : 1 - upperByFraction(a, x);
}

/**
 * Regularised upper incomplete gamma function Q(a, x) = 1 - P(a, x), without the cancellation that difference would
 * suffer for large x. Domain, errors and source as {@link lowerRegularisedGamma}.
 */
export function upperRegularisedGamma(a: number, x: number): number {
  requireDomain(a, x);
  return x < a + 1 ? 1 - lowerBySeries(a, x) : upperByFraction(a, x);
}

function requireDomain(a: number, x: number): void {
  if (!(a > 0 && a < Infinity))
    throw new RangeError(`The shape of a gamma function must be above zero, not ${a}.`);
  if (!(x >= 0)) throw new RangeError(`The argument of a gamma function must be zero or more, not ${x}.`);
}

function lowerBySeries(a: number, x: number): number {
  if (x === 0) return 0;
  let term = 1 / a;
  let sum = term;
  for (let n = 1; n < MAX_TERMS && term > sum * EPSILON; n++) {
    term *= x / (a + n);
    sum += term;
  }
  return sum * Math.exp(a * Math.log(x) - x - gammaln(a));
}

/** Lentz's method; in this order of terms no denominator can vanish for x > a + 1. */
function upperByFraction(a: number, x: number): number {
  if (x === Infinity) return 0;
  let b = x + 1 - a;
  let c = Infinity;
  let d = 1 / b;
  let fraction = d;
  for (let n = 1; n < MAX_TERMS; n++) {
    const numerator = n * (a - n);
    b += 2;
    d = 1 / (b + numerator * d);
    c = b + numerator / c;
    const factor = c * d;
    fraction *= factor;
    if (Math.abs(factor - 1) <= EPSILON) break;
  }
  return fraction * Math.exp(a * Math.log(x) - x - gammaln(a));
}
