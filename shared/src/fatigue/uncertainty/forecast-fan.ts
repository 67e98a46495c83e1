import { dayAfterYears, yearsBetween } from '../life/day-after-years.js';
import { HORIZON_YEARS } from '../life/rule-date.js';
import { quantileOfSorted } from '../statistics/quantile-of-sorted.js';
import { damageAt } from './damage-at.js';
import { type DamageDoubt, type DamagePaths, damagePaths } from './damage-paths.js';
import type { LifeDraws } from './life-draws.js';
import type { DetailRecord, PartRecord } from './life-record.js';
import { yearsToLevel } from './years-to-level.js';

/** Doubts of the fan: use, weather, unlogged hours and loads; none about stress, curve or failure. */
export const FAN_DOUBTS: ReadonlySet<DamageDoubt> = new Set([
  'gain',
  'basis',
  'sampling',
  'days',
  'seasons',
  'unlogged',
  'carried-in',
]);

/** Allowance used on a day, as shares of the draws below it. */
export interface FanRow {
  on: string;
  p05: number;
  p25: number;
  median: number;
  p75: number;
  p95: number;
}

/** The forecast fan of one part. */
export interface ForecastFan {
  /** Allowance used of the detail that is worst in each draw. */
  rows: FanRow[];
  /** Years until the allowance is used up: "3 to 6 years". Infinity beyond the horizon. */
  remainingYears: { p05: number; median: number; p95: number };
  /** The same as days; null beyond the horizon. */
  usedUpOn: { p05: string | null; median: string | null; p95: string | null };
}

/**
 * The fan on the ledger chart: design damage times design fatigue factor against time, under the doubts of use, weather,
 * unlogged hours and loads only. Scatter of the curve has no place in it, because the design curve already stands
 * for it.
 *
 * @param draws shared draws of the vessel
 * @param asOfOn today, 'YYYY-MM-DD'
 * @param days days of the rows, from today on
 * @throws RangeError for a part without details, or a day before today
 */
export function forecastFan(
  draws: LifeDraws,
  part: PartRecord,
  asOfOn: string,
  days: readonly string[],
): ForecastFan {
  if (part.details.length === 0) throw new RangeError(`${part.name} has no assessed detail.`);
  const details = part.details.map((detail) => ({
    detail,
    paths: damagePaths(draws, part, detail, FAN_DOUBTS),
  }));
  const allowance = (draw: number, years: number): number => worstAllowance(details, draw, years, draws);
  const values = new Float64Array(draws.draws);
  const rows = days.map((on) => {
    const years = yearsBetween(asOfOn, on);
    if (years < 0) throw new RangeError(`${on} lies before ${asOfOn}.`);
    for (let i = 0; i < values.length; i++) values[i] = allowance(i, years);
    values.sort();
    return {
      on,
      p05: quantileOfSorted(values, 0.05),
      p25: quantileOfSorted(values, 0.25),
      median: quantileOfSorted(values, 0.5),
      p75: quantileOfSorted(values, 0.75),
      p95: quantileOfSorted(values, 0.95),
    };
  });
  for (let i = 0; i < values.length; i++) {
    values[i] = yearsToLevel((years) => allowance(i, years), 1, HORIZON_YEARS);
  }
  values.sort();
  const remainingYears = {
    p05: quantileOfSorted(values, 0.05),
    median: quantileOfSorted(values, 0.5),
    p95: quantileOfSorted(values, 0.95),
  };
  return {
    rows,
    remainingYears,
    usedUpOn: {
      p05: dayAfterYears(asOfOn, remainingYears.p05),
      median: dayAfterYears(asOfOn, remainingYears.median),
      p95: dayAfterYears(asOfOn, remainingYears.p95),
    },
  };
}

function worstAllowance(
  details: readonly { detail: DetailRecord; paths: DamagePaths }[],
  draw: number,
  years: number,
  draws: LifeDraws,
): number {
  let worst = 0;
  for (const { detail, paths } of details) {
    const damage = damageAt(paths, draw, years, draws.use.yearProfile);
    worst = Math.max(worst, damage * detail.designOverMean * detail.designFatigueFactor);
  }
  return worst;
}
