/**
 * Standard deviation of the natural logarithm of a lognormal quantity: sqrt(ln(1 + cov^2)).
 *
 * @param cov coefficient of variation (standard deviation over mean), zero or more
 * @throws RangeError for a negative one
 */
export function lnSdOfCov(cov: number): number {
  if (!(cov >= 0)) throw new RangeError(`A coefficient of variation must be zero or more, not ${cov}.`);
  return Math.sqrt(Math.log1p(cov * cov));
}

/** The same spread of log10, for curves: standard deviation of ln over ln 10. */
export function log10SdOfLnSd(lnSd: number): number {
  return lnSd / Math.LN10;
}

/** The same spread of ln: standard deviation of log10 times ln 10. */
export function lnSdOfLog10Sd(log10Sd: number): number {
  return log10Sd * Math.LN10;
}

/**
 * Median of a lognormal quantity: mean / sqrt(1 + cov^2).
 *
 * @param mean above zero
 * @param cov coefficient of variation, zero or more
 */
export function lognormalMedian(mean: number, cov: number): number {
  return mean / Math.sqrt(1 + cov * cov);
}
