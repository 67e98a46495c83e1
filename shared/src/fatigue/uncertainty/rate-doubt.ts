import { damageUnderSail, hoursUnderSail } from './days-under-sail.js';
import type { LifeDraws } from './life-draws.js';
import type { DetailRecord } from './life-record.js';

/** How sure the damage per hour of a detail is that a record of few days gives. */
export interface RateDoubt {
  /** One exponent per draw for the ratio of the recorded to the redrawn rate. */
  widening: Float64Array;
  /** Factor on the rate for days worse than a short record shows; 1 or more. */
  worseDays: number;
}

/** A resample that happens to look much surer or less sure than the record is not believed beyond this. */
const MOST_WIDENING = 5;
/** Share of a further day as bad as the worst recorded. */
const FURTHER_WORST_DAY = 0.5;

/**
 * Doubt about a rate from few and uneven days. A handful of days does not hold the worst ones, and then looks surer than
 * it is: the usual percentiles of a bootstrap are too narrow and too low. So each draw is studentised: its departure from
 * the recorded rate, in logarithms, is measured in its own standard error and turned about (where a resample falls
 * short of the record, the truth may exceed it). And the worst recorded day counts one and a half times, because worse
 * ones exist. Both vanish for long records.
 *
 * @returns widening 1 / (standard error of the draw) * (standard error of the record) * sqrt(days / (days - block))
 * Source: studentised (bootstrap-t) intervals of Efron and Tibshirani, An Introduction to the Bootstrap, chapter 12
 * (from memory); the half day is an engineering estimate, checked on simulated vessels only.
 */
export function rateDoubt(draws: LifeDraws, detail: DetailRecord): RateDoubt {
  const { use, blockDays, resampledDays } = draws;
  const days = use.days.length;
  const hours = hoursUnderSail(use);
  const damage = damageUnderSail(use, detail);
  const allHours = hours.reduce((sum, part) => sum + part, 0);
  const allDamage = damage.reduce((sum, part) => sum + part, 0);
  const widening = new Float64Array(draws.draws).fill(1);
  if (allDamage === 0) return { widening, worseDays: 1 };

  const shortfall = days > blockDays ? Math.sqrt(days / (days - blockDays)) : Math.SQRT2;
  const ofRecord = errorOfRecord(damage, hours, allDamage / allHours, blockDays) / allDamage;
  for (let i = 0; i < widening.length; i++) {
    const ofDraw = errorOfDraw(damage, hours, resampledDays, i * days, blockDays);
    widening[i] = shortfall * clamped(ofRecord / ofDraw);
  }
  const worst = damage.indexOf(Math.max(...damage));
  const withWorst =
    (allDamage + FURTHER_WORST_DAY * damage[worst]) / (allHours + FURTHER_WORST_DAY * hours[worst]);
  return { widening, worseDays: Math.max(1, (withWorst * allHours) / allDamage) };
}

function clamped(ratio: number): number {
  // A draw of one day over and over has no error at all: 0 / 0 and x / 0.
  if (Number.isNaN(ratio)) return 1;
  return Math.min(Math.max(ratio, 1 / MOST_WIDENING), MOST_WIDENING);
}

/** Standard error of the sum of damages about the rate, from all blocks of neighbouring days. */
function errorOfRecord(damage: Float64Array, hours: Float64Array, rate: number, blockDays: number): number {
  const days = damage.length;
  const blocks = days - blockDays + 1;
  let squares = 0;
  for (let start = 0; start < blocks; start++) {
    let departure = 0;
    for (let day = start; day < start + blockDays; day++) departure += damage[day] - rate * hours[day];
    squares += departure * departure;
  }
  return Math.sqrt((squares / blocks) * (days / blockDays));
}

/** The same for one resample, from its own blocks, over its sum of damages. */
function errorOfDraw(
  damage: Float64Array,
  hours: Float64Array,
  resampledDays: Int32Array,
  offset: number,
  blockDays: number,
): number {
  const days = damage.length;
  let sum = 0;
  let time = 0;
  for (let i = offset; i < offset + days; i++) {
    sum += damage[resampledDays[i]];
    time += hours[resampledDays[i]];
  }
  const rate = time > 0 ? sum / time : 0;
  let squares = 0;
  for (let start = 0; start < days; start += blockDays) {
    const end = Math.min(start + blockDays, days);
    let departure = 0;
    for (let i = start; i < end; i++) {
      departure += damage[resampledDays[offset + i]] - rate * hours[resampledDays[offset + i]];
    }
    squares += departure * departure;
  }
  return Math.sqrt(squares) / sum;
}
