/** Turns a median absolute deviation of normal numbers into their standard deviation, 1 / (sqrt 2 * erfinv(1/2)). */
const DEVIATION_FACTOR = 1.4826;

/** A sample that stands apart from its neighbours. */
export interface Outlier {
  index: number;
  /** Median of its window: what it would be replaced by, were loads ever replaced. */
  median: number;
  /** Deviation of its window, estimated from medians. */
  deviation: number;
}

/**
 * Samples further from the median of their window than so many of its deviations. It marks and never changes a load:
 * a slam or gybe caught by one sample looks the same, and is just what fatigue is about.
 *
 * @param samples in time order, without NaN
 * @param options halfWidth: neighbours on each side, 3 unless given (windows are cut at the ends); deviations: 3 unless
 *   given; floor: least deviation, so that loads that stand still between steps of the resolution are not marked
 * @throws RangeError for a half width that is not a whole number from 1 on
 * Source: Hampel identifier (published; three neighbours and three deviations are its usual figures).
 */
export function hampelOutliers(
  samples: ArrayLike<number>,
  options: { halfWidth?: number; deviations?: number; floor?: number } = {},
): Outlier[] {
  const { halfWidth = 3, deviations = 3, floor = 0 } = options;
  if (!(Number.isInteger(halfWidth) && halfWidth >= 1)) {
    throw new RangeError(`A window needs at least one neighbour on each side, not ${halfWidth}.`);
  }
  const outliers: Outlier[] = [];
  for (let index = 0; index < samples.length; index++) {
    const window: number[] = [];
    const end = Math.min(samples.length, index + halfWidth + 1);
    for (let i = Math.max(0, index - halfWidth); i < end; i++) window.push(samples[i]);
    const median = medianOf(window);
    const deviation = DEVIATION_FACTOR * medianOf(window.map((value) => Math.abs(value - median)));
    if (Math.abs(samples[index] - median) > deviations * Math.max(deviation, floor)) {
      outliers.push({ index, median, deviation });
    }
  }
  return outliers;
}

function medianOf(values: number[]): number {
  const sorted = [...values].sort((one, other) => one - other);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}
