/** Coefficients of numerator and denominator, highest power first. */
const NUMERATOR = [
  0.0352624965998911, 0.700383064443688, 6.37396220353165, 33.912866078383, 112.079291497871,
  221.213596169931, 220.206867912376,
];
const DENOMINATOR = [
  0.0883883476483184, 1.75566716318264, 16.064177579207, 86.7807322029461, 296.564248779674, 637.333633378831,
  793.826512519948, 440.413735824752,
];
const [N0, N1, N2, N3, N4, N5, N6] = NUMERATOR;
const [D0, D1, D2, D3, D4, D5, D6, D7] = DENOMINATOR;
const RATIONAL_BELOW = 7.07106781186547;

/**
 * Standard normal distribution function to 1e-15, and to eight digits in its tails, several times as fast as normalCdf:
 * forecasts ask it millions of times.
 *
 * Source: Hart et al., Computer Approximations (1968), as arranged by West (2005), from memory; checked against
 * normalCdf.
 */
export function fastNormalCdf(x: number): number {
  const size = Math.abs(x);
  if (!(size < 37)) return Number.isNaN(x) ? NaN : x < 0 ? 0 : 1;
  const bell = Math.exp((-size * size) / 2);
  let tail: number;
  if (size < RATIONAL_BELOW) {
    const above = (((((N0 * size + N1) * size + N2) * size + N3) * size + N4) * size + N5) * size + N6;
    const below =
      ((((((D0 * size + D1) * size + D2) * size + D3) * size + D4) * size + D5) * size + D6) * size + D7;
    tail = (bell * above) / below;
  } else {
    const fraction = size + 1 / (size + 2 / (size + 3 / (size + 4 / (size + 0.65))));
    tail = bell / fraction / 2.506628274631;
  }
  return x > 0 ? 1 - tail : tail;
}
