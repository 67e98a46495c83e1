import { damageOfSpectrum } from '../damage/damage-of-spectrum.js';
import type { DetailModel } from '../damage/detail-model.js';
import { cycleTableOf } from '../rainflow/cycle-table.js';
import { emptySpectrum } from '../rainflow/load-spectrum.js';

/** One line of a log that stores only the extremes of each interval, kN. */
export interface IntervalExtremes {
  minKn: number;
  maxKn: number;
}

/** Bounds of the damage behind a summary log. */
export interface SummaryLogBounds {
  /** One cycle from lowest to highest in each interval. */
  lower: number;
  /** Cycles of that range at 0.25 Hz through the whole interval. The rule date uses this one; both are shown. */
  upper: number;
}

/** How often a rig is taken to be cycled where only extremes are known. Engineering estimate. */
export const SUMMARY_CYCLE_HZ = 0.25;

/**
 * Damage of a log that stores minimum and maximum per interval: at least one cycle each, at most cycles of that range
 * at 0.25 Hz throughout.
 *
 * @param intervals in any order; one whose highest is not above its lowest does no damage
 * @param intervalS length of an interval, s
 * @throws RangeError for an interval that is not above zero, or a highest below its lowest
 */
export function summaryLogBounds(
  intervals: readonly IntervalExtremes[],
  intervalS: number,
  detail: DetailModel,
): SummaryLogBounds {
  if (!(intervalS > 0)) throw new RangeError(`An interval must be longer than zero, not ${intervalS}.`);
  const cycling = intervals.filter(({ minKn, maxKn }) => {
    if (!(maxKn >= minKn)) throw new RangeError(`The highest load ${maxKn} lies below the lowest ${minKn}.`);
    return maxKn > minKn;
  });
  const lower = damageOfSpectrum(
    {
      ...emptySpectrum(0),
      days: [
        {
          day: 0,
          cycles: cycleTableOf(
            cycling.map(({ minKn }) => minKn),
            cycling.map(({ maxKn }) => maxKn),
          ),
        },
      ],
    },
    detail,
  ).damage;
  return { lower, upper: lower * Math.max(1, intervalS * SUMMARY_CYCLE_HZ) };
}
