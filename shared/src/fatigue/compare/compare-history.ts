import type { LoadSpectrum } from '../rainflow/load-spectrum.js';

/** A load history pressed into few cycles, so that a material can be tried on it while somebody watches. */
export interface CompareHistory {
  /** Load ranges and means of representative cycles, kN, with their counts. */
  rangeKn: Float64Array;
  meanKn: Float64Array;
  count: Float64Array;
  /** The same without means, for details on which only the range matters. */
  rangesOnlyKn: Float64Array;
  rangesOnlyCount: Float64Array;
  highestKn: number;
  /** Sailing hours the history stands for. */
  hours: number;
}

const RANGE_BINS = 1024;
const MEAN_BINS = 32;
/** Slope in the middle of those in use: a bin's cycles are replaced by the range that does their damage at it. */
const SLOPE = 4.5;

/**
 * Presses a spectrum into at most 1,024 ranges by 32 means. Each bin is replaced by as many cycles of its power mean of
 * order 4.5; closed cycles count 1, residue pairs one half. The damage moves by less than 0.1 % on curves in use.
 *
 * @param spectrum of all logs together, see wholeHistory
 * @param hours sailing hours it stands for, above zero
 * @throws RangeError for hours that are not above zero
 */
export function compareHistory(spectrum: LoadSpectrum, hours: number): CompareHistory {
  if (!(hours > 0)) throw new RangeError(`A history needs hours above zero, not ${hours}.`);
  const { largest, lowestMean, highestMean, highestKn } = extent(spectrum);
  const both = new Bins(RANGE_BINS * MEAN_BINS);
  const ranges = new Bins(RANGE_BINS);
  const meanWidth = Math.max(highestMean - lowestMean, Number.MIN_VALUE);
  forEachCycle(spectrum, (low, high, count) => {
    const range = high - low;
    const mean = (low + high) / 2;
    if (range === 0) return;
    const row = Math.min(Math.floor((range / largest) * RANGE_BINS), RANGE_BINS - 1);
    const column = Math.min(Math.floor(((mean - lowestMean) / meanWidth) * MEAN_BINS), MEAN_BINS - 1);
    both.add(row * MEAN_BINS + column, range, mean, count);
    ranges.add(row, range, mean, count);
  });
  const cycles = both.representatives();
  const only = ranges.representatives();
  return {
    rangeKn: cycles.ranges,
    meanKn: cycles.means,
    count: cycles.counts,
    rangesOnlyKn: only.ranges,
    rangesOnlyCount: only.counts,
    highestKn,
    hours,
  };
}

class Bins {
  private readonly counts: Float64Array;
  private readonly weights: Float64Array;
  private readonly means: Float64Array;

  constructor(size: number) {
    this.counts = new Float64Array(size);
    this.weights = new Float64Array(size);
    this.means = new Float64Array(size);
  }

  add(bin: number, range: number, mean: number, count: number): void {
    const weight = count * range ** SLOPE;
    this.counts[bin] += count;
    this.weights[bin] += weight;
    this.means[bin] += weight * mean;
  }

  representatives(): { ranges: Float64Array; means: Float64Array; counts: Float64Array } {
    const used = Array.from(this.counts.keys()).filter((bin) => this.counts[bin] > 0);
    return {
      ranges: Float64Array.from(used, (bin) => (this.weights[bin] / this.counts[bin]) ** (1 / SLOPE)),
      means: Float64Array.from(used, (bin) => this.means[bin] / this.weights[bin]),
      counts: Float64Array.from(used, (bin) => this.counts[bin]),
    };
  }
}

function forEachCycle(
  spectrum: LoadSpectrum,
  take: (lowKn: number, highKn: number, count: number) => void,
): void {
  const kn = spectrum.step > 0 ? spectrum.step : 1;
  for (const { cycles } of spectrum.days) {
    const { low, high, count } = cycles;
    for (let i = 0; i < low.length; i++) take(low[i] * kn, high[i] * kn, count[i]);
  }
  const { residue } = spectrum;
  for (let i = 1; i < residue.length; i++) {
    take(Math.min(residue[i - 1], residue[i]) * kn, Math.max(residue[i - 1], residue[i]) * kn, 0.5);
  }
}

function extent(spectrum: LoadSpectrum): {
  largest: number;
  lowestMean: number;
  highestMean: number;
  highestKn: number;
} {
  let largest = 0;
  let lowestMean = Infinity;
  let highestMean = -Infinity;
  let highestKn = 0;
  forEachCycle(spectrum, (low, high) => {
    const mean = (low + high) / 2;
    if (high - low > largest) largest = high - low;
    if (mean < lowestMean) lowestMean = mean;
    if (mean > highestMean) highestMean = mean;
    if (high > highestKn) highestKn = high;
  });
  return { largest, lowestMean, highestMean, highestKn };
}
