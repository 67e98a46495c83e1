import { dayAfterYears } from '../life/day-after-years.js';
import { HORIZON_YEARS } from '../life/rule-date.js';
import { failureProbabilityAt } from './failure-probability-at.js';
import type { PartLife } from './part-life.js';
import { targetProbability } from './target-probability.js';
import { yearsToFailureProbability } from './years-to-failure-probability.js';

/** The reliability date of a part: mean curves, no design fatigue factor, all doubts. */
export interface ReliabilityDate {
  /** Probability of having failed at which to replace. */
  target: number;
  /** Probability of having failed today, counted from the day it was fitted. */
  probabilityNow: number;
  /** 0 once the target is reached; Infinity beyond the horizon. */
  remainingYears: number;
  /** Null beyond the horizon. */
  replaceByOn: string | null;
  overdue: boolean;
  /** Even odds, for the chart of probability only: not for planning, never in a mail or summary. */
  evenOddsOn: string | null;
}

/**
 * The day on which the probability of having failed reaches 1 % (its loss drops the mast) or 5 % (other parts).
 * It stands on the mean curve and all doubts, and is never multiplied with a design fatigue factor: that belongs to the
 * rule date.
 *
 * @param life the drawn life of the part
 * @param asOfOn day the question is asked for, 'YYYY-MM-DD'
 * @param target another probability, where a firm has set one
 */
export function reliabilityDate(
  life: PartLife,
  asOfOn: string,
  target: number = targetProbability(life.part.lossDropsMast),
): ReliabilityDate {
  const remainingYears = yearsToFailureProbability(life, target, HORIZON_YEARS);
  return {
    target,
    probabilityNow: failureProbabilityAt(life, 0),
    remainingYears,
    replaceByOn: remainingYears === 0 ? asOfOn : dayAfterYears(asOfOn, remainingYears),
    overdue: remainingYears === 0,
    evenOddsOn: dayAfterYears(asOfOn, yearsToFailureProbability(life, 0.5, HORIZON_YEARS)),
  };
}
