import type { UsageState } from './usage-state.js';

/** One line of an owner's plan. */
export interface PlannedUse {
  /** Calendar month, 1 to 12. */
  month: number;
  state: UsageState;
  hours: number;
}

/** Use of one past season. */
export interface SeasonUse {
  season: number;
  hours: Readonly<Partial<Record<UsageState, number>>>;
}

/** Hours a year will hold, and what that stands on. */
export interface YearOfUse {
  hoursPerYear: Partial<Record<UsageState, number>>;
  /** Sailing hours by month, January first; null where only a year's figure is known. */
  sailingByMonth: number[] | null;
  basis: 'plan' | 'past-seasons';
  words: string;
}

/** Seasons looked back on where no plan was stated. */
const SEASONS = 3;

/**
 * Hours of a coming year by state: the owner's plan where there is one, else the mean of the last seasons (three at
 * most), else nothing, and then there is no forecast.
 *
 * @param plan null or empty where none was stated
 * @param pastSeasons whole seasons with known hours, logged or not
 * @returns null where neither is known
 * @throws RangeError for a month or hours that cannot be
 */
export function plannedUse(
  plan: readonly PlannedUse[] | null,
  pastSeasons: readonly SeasonUse[],
): YearOfUse | null {
  if (plan !== null && plan.length > 0) {
    const hoursPerYear: Partial<Record<UsageState, number>> = {};
    const sailingByMonth = new Array<number>(12).fill(0);
    for (const { month, state, hours } of plan) {
      if (!(Number.isInteger(month) && month >= 1 && month <= 12)) {
        throw new RangeError(`A month must be a whole number from 1 to 12, not ${month}.`);
      }
      if (!(hours >= 0)) throw new RangeError(`Hours must be zero or more, not ${hours}.`);
      hoursPerYear[state] = (hoursPerYear[state] ?? 0) + hours;
      if (state === 'sailing') sailingByMonth[month - 1] += hours;
    }
    return { hoursPerYear, sailingByMonth, basis: 'plan', words: "The owner's plan." };
  }
  const last = [...pastSeasons].sort((one, other) => other.season - one.season).slice(0, SEASONS);
  if (last.length === 0) return null;
  const hoursPerYear: Partial<Record<UsageState, number>> = {};
  for (const { hours } of last) {
    for (const [state, amount] of Object.entries(hours) as [UsageState, number][]) {
      if (!(amount >= 0)) throw new RangeError(`Hours must be zero or more, not ${amount}.`);
      hoursPerYear[state] = (hoursPerYear[state] ?? 0) + amount / last.length;
    }
  }
  return {
    hoursPerYear,
    sailingByMonth: null,
    basis: 'past-seasons',
    words:
      last.length === 1
        ? 'No plan was stated: as in the last season.'
        : `No plan was stated: the mean of the last ${last.length} seasons.`,
  };
}
