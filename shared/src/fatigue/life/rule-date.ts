import { DAYS_PER_YEAR, dayNumber, dayOfNumber } from './days.js';

/** What the rule date of one detail follows from. */
export interface RuleDateInput {
  /** Day the question is asked for, 'YYYY-MM-DD'. */
  asOfOn: string;
  /** Design damage posted so far (design curve). */
  damage: number;
  /** Design fatigue factor, 1 or more. */
  dff: number;
  /** Design damage per hour of sailing, from the logs. */
  designDamagePerSailingHour: number;
  /** Planned sailing hours per year. */
  plannedHoursPerYear: number;
}

/** Rule date of one detail. */
export interface RuleDate {
  /** damage * dff; 1 is the whole allowance. */
  allowanceUsed: number;
  /** Years until the allowance is used up at the planned sailing; 0 once it is; Infinity where nothing is being used. */
  remainingYears: number;
  /** Day by which to replace; null where it lies more than {@link HORIZON_YEARS} ahead. */
  replaceByOn: string | null;
  /** True once the allowance is used up. */
  overdue: boolean;
}

/** Beyond this many years no fatigue date is named: nothing on a rig lasts that long, another rule governs. */
export const HORIZON_YEARS = 100;

/**
 * The rule date: now + (1 / DFF - D) / (damage per sailing hour * planned hours per year), rounded down to a whole day.
 *
 * @throws RangeError for a DFF below 1, a negative damage, rate or plan, or NaN
 * Source: the allowable sum 1 / DFF as in offshore fatigue rules (for example DNV-RP-C203, from memory); the use of
 * planned hours is ours.
 */
export function ruleDate(input: RuleDateInput): RuleDate {
  const { asOfOn, damage, dff, designDamagePerSailingHour, plannedHoursPerYear } = input;
  if (!(dff >= 1)) throw new RangeError(`A design fatigue factor must be 1 or more, not ${dff}.`);
  for (const [name, value] of Object.entries({ damage, designDamagePerSailingHour, plannedHoursPerYear })) {
    if (!(value >= 0)) throw new RangeError(`${name} must be zero or more, not ${value}.`);
  }
  const today = dayNumber(asOfOn);
  const allowanceUsed = damage * dff;
  if (allowanceUsed >= 1) return { allowanceUsed, remainingYears: 0, replaceByOn: asOfOn, overdue: true };
  const damagePerYear = designDamagePerSailingHour * plannedHoursPerYear;
  const remainingYears = damagePerYear === 0 ? Infinity : Math.max(1 / dff - damage, 0) / damagePerYear;
  const replaceByOn =
    remainingYears > HORIZON_YEARS ? null : dayOfNumber(today + Math.floor(remainingYears * DAYS_PER_YEAR));
  return { allowanceUsed, remainingYears, replaceByOn, overdue: false };
}
