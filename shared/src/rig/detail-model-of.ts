import type { ReferenceCurve } from '../fatigue/curves/curve.js';
import { assertMeanRuleAllowed } from '../fatigue/damage/assert-mean-rule-allowed.js';
import type { DetailModel } from '../fatigue/damage/detail-model.js';
import type { PartDetail } from './part-detail.js';

/**
 * The model of a detail with its curve put in, ready for damageOfSpectrum.
 *
 * @param curve the reference curve with the id and version the detail names
 * @returns null for a detail that is not assessed
 * @throws RangeError when the curve is another one than the detail names
 * @throws MeanRuleRefusedError when the detail carries a mean rule its curve refuses
 */
export function detailModelOf(
  detail: Pick<PartDetail, 'curveId' | 'curveVersion' | 'inputs' | 'name'>,
  curve: ReferenceCurve,
): DetailModel | null {
  if (detail.inputs === null) return null;
  if (curve.id !== detail.curveId || curve.version !== detail.curveVersion) {
    throw new RangeError(
      `The ${detail.name} is assessed on ${detail.curveId} version ${detail.curveVersion}, not on ${curve.id} version ${curve.version}.`,
    );
  }
  assertMeanRuleAllowed(curve, detail.inputs.mean);
  return { ...detail.inputs, curve };
}
