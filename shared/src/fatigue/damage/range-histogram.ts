/** Cycles whose range falls between two bounds, and the damage they do. */
export interface RangeBin {
  /** Lower bound, in the measure of the curve. */
  low: number;
  /** Upper bound, same measure. */
  high: number;
  /** Mean range of the cycles in the bin, weighted by their number. */
  range: number;
  /** Cycles, residue pairs as halves. */
  count: number;
  damage: number;
}

/**
 * Bins of equal width from zero to the largest range; empty bins are left out, so the list is short for a short log.
 *
 * @param ranges in the measure of the curve
 * @param counts cycles at each range
 * @param damages damage of those cycles
 * @param largest largest of the ranges
 * @param binCount number of bins over the whole width
 */
export function rangeHistogram(
  ranges: ArrayLike<number>,
  counts: ArrayLike<number>,
  damages: ArrayLike<number>,
  largest: number,
  binCount: number,
): RangeBin[] {
  if (!(largest > 0) || !Number.isFinite(largest)) return [];
  const width = largest / binCount;
  const weighted = new Float64Array(binCount);
  const count = new Float64Array(binCount);
  const damage = new Float64Array(binCount);
  for (let i = 0; i < ranges.length; i++) {
    const bin = Math.min(Math.floor(ranges[i] / width), binCount - 1);
    count[bin] += counts[i];
    weighted[bin] += counts[i] * ranges[i];
    damage[bin] += damages[i];
  }
  const bins: RangeBin[] = [];
  for (let bin = 0; bin < binCount; bin++) {
    if (count[bin] === 0) continue;
    bins.push({
      low: bin * width,
      high: (bin + 1) * width,
      range: weighted[bin] / count[bin],
      count: count[bin],
      damage: damage[bin],
    });
  }
  return bins;
}
