import type { ReferenceCurve } from '../curves/curve.js';
import { shiftToMean } from '../curves/shift-to-mean.js';
import type { DetailModel } from '../damage/detail-model.js';

/**
 * The same detail on its mean curve: what the reliability date and a comparison of materials stand on. Only the curve's
 * own k and scatter shift it; doubt about its fitness never does.
 *
 * @param detail a detail with a curve of the reference data
 */
export function meanDetail(detail: Omit<DetailModel, 'curve'> & { curve: ReferenceCurve }): DetailModel {
  return { ...detail, curve: { ...detail.curve, segments: shiftToMean(detail.curve) } };
}
