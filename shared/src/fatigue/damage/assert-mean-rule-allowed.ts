import type { ReferenceCurve } from '../curves/curve.js';
import type { MeanLoadRule } from './mean-load.js';
import { MeanRuleRefusedError } from './mean-rule-refused-error.js';

/**
 * Refuses a mean-load rule on a curve that must not carry one: design curves measured under tension already contain
 * their mean, and a curve with a mean-load term of its own would be corrected twice.
 *
 * @throws MeanRuleRefusedError unless the rule is 'none' or the curve states the stress ratio of its tests
 */
export function assertMeanRuleAllowed(curve: ReferenceCurve, rule: MeanLoadRule): void {
  if (rule.kind === 'none') return;
  const { meanLoad } = curve;
  if (meanLoad.kind !== 'rule-allowed') throw new MeanRuleRefusedError(curve.id, rule.kind, meanLoad.reason);
}
