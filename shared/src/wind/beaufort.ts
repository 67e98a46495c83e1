/** Lowest wind speed of Beaufort 1 to 12, m/s, 10-minute mean at 10 m. */
const LOWER_BOUNDS_MPS = [0.3, 1.6, 3.4, 5.5, 8.0, 10.8, 13.9, 17.2, 20.8, 24.5, 28.5, 32.7];

/**
 * Beaufort number of a wind speed, intervals closed below: 17.2 m/s is 8, 17.19 is 7.
 *
 * @param speedMps m/s, zero or more
 * @throws RangeError for a negative speed or NaN
 * Source: WMO scale, bounds in m/s (published).
 */
export function beaufort(speedMps: number): number {
  if (!(speedMps >= 0)) throw new RangeError(`A wind speed must be zero or more, not ${speedMps}.`);
  const above = LOWER_BOUNDS_MPS.findIndex((bound) => speedMps < bound);
  return above === -1 ? LOWER_BOUNDS_MPS.length : above;
}
