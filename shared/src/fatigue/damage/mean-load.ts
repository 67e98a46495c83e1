import { MeanAboveUltimateError } from './mean-above-ultimate-error.js';

/**
 * Rule that turns a range at a mean into the equally damaging range of the curve's tests. `ultimate` is in the
 * measure of the curve (MPa, or 1 for load over breaking load).
 */
export type MeanLoadRule =
  | { kind: 'none' }
  | { kind: 'goodman'; ultimate: number }
  | { kind: 'gerber'; ultimate: number }
  | { kind: 'walker'; gamma: number };

/**
 * Fully reversed amplitude after Goodman: amplitude / (1 - mean / ultimate). A mean in compression earns no credit.
 *
 * @param amplitude half the range, MPa
 * @param mean mean stress, MPa
 * @param ultimate ultimate strength, MPa
 * @returns amplitude at zero mean that does the same damage, MPa
 * @throws MeanAboveUltimateError when mean >= ultimate
 * Source: textbook form, e.g. Shigley's Mechanical Engineering Design, chapter 6.
 */
export function goodmanAmplitude(amplitude: number, mean: number, ultimate: number): number {
  if (mean >= ultimate) throw new MeanAboveUltimateError(mean, ultimate);
  return mean > 0 ? amplitude / (1 - mean / ultimate) : amplitude;
}

/**
 * Fully reversed amplitude after Gerber: amplitude / (1 - (mean / ultimate)^2), for tensile means only.
 * Units, errors and source as {@link goodmanAmplitude}.
 */
export function gerberAmplitude(amplitude: number, mean: number, ultimate: number): number {
  if (mean >= ultimate) throw new MeanAboveUltimateError(mean, ultimate);
  return mean > 0 ? amplitude / (1 - (mean / ultimate) ** 2) : amplitude;
}

/**
 * Fully reversed amplitude after Soderberg: Goodman's line drawn to the yield strength.
 *
 * @param yieldStrength yield strength, MPa; otherwise as {@link goodmanAmplitude}
 */
export function soderbergAmplitude(amplitude: number, mean: number, yieldStrength: number): number {
  return goodmanAmplitude(amplitude, mean, yieldStrength);
}

/**
 * Fully reversed amplitude after Morrow: Goodman's line drawn to the true fracture strength, for steels about the
 * ultimate strength + 345 MPa (from memory, Dowling).
 *
 * @param trueFractureStrength MPa; otherwise as {@link goodmanAmplitude}
 */
export function morrowAmplitude(amplitude: number, mean: number, trueFractureStrength: number): number {
  return goodmanAmplitude(amplitude, mean, trueFractureStrength);
}

/**
 * Fully reversed amplitude after Smith, Watson and Topper: square root of (highest stress * amplitude). It is
 * Walker's rule with gamma 0.5.
 *
 * @param amplitude MPa
 * @param mean MPa; zero or compression earns no credit
 */
export function swtAmplitude(amplitude: number, mean: number): number {
  return walkerAmplitude(amplitude, mean, 0.5);
}

/**
 * Fully reversed amplitude after Walker: highest stress^(1 - gamma) * amplitude^gamma.
 *
 * @param amplitude MPa
 * @param mean MPa; zero or compression earns no credit
 * @param gamma 0 to 1, about 0.65 for steels; higher means less sensitive to the mean
 * @throws RangeError for gamma outside 0 to 1
 */
export function walkerAmplitude(amplitude: number, mean: number, gamma: number): number {
  if (!(gamma >= 0 && gamma <= 1))
    throw new RangeError(`Walker's gamma must lie between 0 and 1, not ${gamma}.`);
  return mean > 0 ? (amplitude + mean) ** (1 - gamma) * amplitude ** gamma : amplitude;
}

/**
 * Amplitude at another stress ratio R that does the damage of a fully reversed one, along Goodman's line:
 * reversed / (1 + (reversed / ultimate) * (1 + R) / (1 - R)).
 *
 * @param reversedAmplitude MPa
 * @param ultimate MPa
 * @param stressRatio R = lowest / highest stress, below 1
 * @throws RangeError for R >= 1
 */
export function amplitudeAtStressRatio(
  reversedAmplitude: number,
  ultimate: number,
  stressRatio: number,
): number {
  if (!(stressRatio < 1)) throw new RangeError(`The stress ratio R must be below 1, not ${stressRatio}.`);
  return reversedAmplitude / (1 + (reversedAmplitude / ultimate) * ((1 + stressRatio) / (1 - stressRatio)));
}

/**
 * Range at one mean-load ratio moved to another along Goodman's line: range * (1 - to) / (1 - from).
 *
 * @param range any measure
 * @param fromMeanRatio mean load over breaking load of the cycle
 * @param toMeanRatio mean load over breaking load to refer it to
 * @throws MeanAboveUltimateError when a ratio is 1 or more
 */
export function rangeAtMeanRatio(range: number, fromMeanRatio: number, toMeanRatio: number): number {
  if (fromMeanRatio >= 1) throw new MeanAboveUltimateError(fromMeanRatio, 1);
  if (toMeanRatio >= 1) throw new MeanAboveUltimateError(toMeanRatio, 1);
  return (range * (1 - toMeanRatio)) / (1 - fromMeanRatio);
}

/**
 * Range at zero mean that does the damage of `range` at `mean`, by the given rule. Goodman in its load form is
 * S / (1 - mean / ultimate) for a positive mean; a negative mean earns no credit under any rule.
 *
 * @param range full range in the measure of the curve
 * @param mean mean in the same measure
 * @throws MeanAboveUltimateError for Goodman and Gerber when mean >= ultimate
 */
export function rangeAtZeroMean(range: number, mean: number, rule: MeanLoadRule): number {
  switch (rule.kind) {
    case 'none':
      return range;
    case 'goodman':
      return goodmanAmplitude(range, mean, rule.ultimate);
    case 'gerber':
      return gerberAmplitude(range, mean, rule.ultimate);
    case 'walker':
      return 2 * walkerAmplitude(range / 2, mean, rule.gamma);
  }
}

/**
 * Range at the stress ratio of a curve's tests that does the damage of `range` at `mean`, by the given rule: first
 * moved to R = -1 ({@link rangeAtZeroMean}), then along the same rule to R.
 *
 * @param range full range in the measure of the curve
 * @param mean mean in the same measure
 * @param referenceR R = lowest / highest of the curve's tests, below 1; -1 for fully reversed
 * @throws MeanAboveUltimateError as {@link rangeAtZeroMean}
 * @throws RangeError for R >= 1
 */
export function rangeAtReference(
  range: number,
  mean: number,
  rule: MeanLoadRule,
  referenceR: number,
): number {
  if (!(referenceR < 1)) throw new RangeError(`The stress ratio R must be below 1, not ${referenceR}.`);
  const reversed = rangeAtZeroMean(range, mean, rule) / 2;
  switch (rule.kind) {
    case 'none':
      return range;
    case 'goodman':
      return 2 * amplitudeAtStressRatio(reversed, rule.ultimate, referenceR);
    case 'gerber': {
      // amplitude = reversed * (1 - (meanOverAmplitude * amplitude / ultimate)^2), solved for the amplitude.
      const meanOverAmplitude = (1 + referenceR) / (1 - referenceR);
      const ratio = (reversed * meanOverAmplitude) / rule.ultimate;
      return (4 * reversed) / (1 + Math.sqrt(1 + 4 * ratio ** 2));
    }
    case 'walker':
      return 2 * reversed * ((1 - referenceR) / 2) ** (1 - rule.gamma);
  }
}
