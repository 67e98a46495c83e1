import { useByShare, type YearProfile } from '../usage/year-profile.js';
import type { DamagePaths } from './damage-paths.js';

/**
 * Damage of one draw some years from today. Within a year use falls as its profile says; beyond the drawn years each
 * further one adds the mean of those drawn.
 *
 * @param draw index of the draw
 * @param years from today, zero or more
 */
export function damageAt(
  paths: DamagePaths,
  draw: number,
  years: number,
  profile: YearProfile | undefined,
): number {
  const start = draw * (paths.years + 1);
  const { cumulative } = paths;
  if (years >= paths.years) {
    const end = cumulative[start + paths.years];
    return end + ((end - cumulative[start]) / paths.years) * (years - paths.years);
  }
  const whole = Math.floor(years);
  const from = cumulative[start + whole];
  return from + (cumulative[start + whole + 1] - from) * useByShare(profile, years - whole);
}
