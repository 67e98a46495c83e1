/** How the slow part of a load is taken off before its waves are counted. */
const DETREND_S = 30;

/**
 * Dominant frequency of a load: upward crossings of its own running mean (30 s) per second. Gusts and tacks are slower
 * than that and drop out; what is left is the frequency the rig is really cycled at.
 *
 * A crossing counts once the load has been below the mean by the threshold and then above it by the threshold, so that
 * noise about the mean is not taken for waves.
 *
 * @param samples loads in time order, evenly spaced; NaN breaks the count and is left out of the time
 * @param rateHz samples per second
 * @param threshold same unit as the loads; the resolution or noise of the recording, 0 for none
 * @returns Hz; null with less than a minute of samples
 * @throws RangeError for a rate that is not above zero
 * Source: zero-up-crossing rate, as in wave records (common practice); window of 30 s an engineering estimate.
 */
export function dominantFrequencyHz(
  samples: ArrayLike<number>,
  rateHz: number,
  threshold = 0,
): number | null {
  if (!(rateHz > 0)) throw new RangeError(`A sampling rate must be above zero, not ${rateHz}.`);
  const half = Math.max(1, Math.round((DETREND_S * rateHz) / 2));
  const n = samples.length;
  // Running sums let the mean of a window be two subtractions; missing samples add nothing.
  const sums = new Float64Array(n + 1);
  const counts = new Float64Array(n + 1);
  for (let i = 0; i < n; i++) {
    const present = Number.isNaN(samples[i]) ? 0 : 1;
    sums[i + 1] = sums[i] + (present === 1 ? samples[i] : 0);
    counts[i + 1] = counts[i] + present;
  }
  if (counts[n] < 60 * rateHz) return null;
  let crossings = 0;
  let below = false;
  for (let i = 0; i < n; i++) {
    if (Number.isNaN(samples[i])) {
      below = false;
      continue;
    }
    const from = Math.max(0, i - half);
    const to = Math.min(n, i + half + 1);
    const departure = samples[i] - (sums[to] - sums[from]) / (counts[to] - counts[from]);
    if (departure < -threshold) below = true;
    else if (departure > threshold && below) {
      crossings++;
      below = false;
    }
  }
  return (crossings * rateHz) / counts[n];
}
