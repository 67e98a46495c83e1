/**
 * Every so-manieth sample of a series: what a logger of a lower rate would have stored.
 *
 * @param samples in time order
 * @param by keep one in so many, a whole number from 1 on
 * @param start index of the first one kept, below `by`
 * @throws RangeError for anything else
 */
export function decimated(samples: ArrayLike<number>, by: number, start = 0): Float64Array {
  if (!(Number.isInteger(by) && by >= 1 && Number.isInteger(start) && start >= 0 && start < by)) {
    throw new RangeError(`One in ${by} from ${start} on is no way to thin a series.`);
  }
  const kept = new Float64Array(Math.max(0, Math.ceil((samples.length - start) / by)));
  for (let i = 0; i < kept.length; i++) kept[i] = samples[start + i * by];
  return kept;
}
