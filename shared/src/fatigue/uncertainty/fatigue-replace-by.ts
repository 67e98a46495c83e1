import type { RuleDate } from '../life/rule-date.js';
import type { ReliabilityDate } from './reliability-date.js';

/** Fatigue replace-by date with both dates it is the earlier of. */
export interface FatigueReplaceBy {
  replaceByOn: string | null;
  remainingYears: number;
  /** Which of the two is the earlier; 'rule' on the same day, null where neither lies within the horizon. */
  governs: 'rule' | 'reliability' | null;
  overdue: boolean;
  /** (A) design curve, central use, damage times design fatigue factor. */
  rule: RuleDate;
  /** (B) mean curve, all doubts, no factor. */
  reliability: ReliabilityDate;
}

/**
 * The earlier of rule date and reliability date. They are two calculations: their factors are never multiplied, and
 * both are shown.
 */
export function fatigueReplaceBy(rule: RuleDate, reliability: ReliabilityDate): FatigueReplaceBy {
  const ruleFirst = rule.remainingYears <= reliability.remainingYears;
  const first = ruleFirst ? rule : reliability;
  return {
    replaceByOn: first.replaceByOn,
    remainingYears: first.remainingYears,
    governs: first.replaceByOn === null ? null : ruleFirst ? 'rule' : 'reliability',
    overdue: rule.overdue || reliability.overdue,
    rule,
    reliability,
  };
}
