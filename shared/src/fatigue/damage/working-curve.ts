import type { Curve } from '../curves/curve.js';
import { divideLife } from '../curves/divide-life.js';
import { withoutCutOff } from '../curves/without-cut-off.js';
import type { DetailModel } from './detail-model.js';

/** The curve a detail is really assessed on: its cut-off removed where none is trusted, its life divided for surroundings. */
export function workingCurve(detail: Pick<DetailModel, 'curve' | 'cutOff' | 'lifeDivisor'>): Curve {
  const segments = detail.cutOff === 'none' ? withoutCutOff(detail.curve) : detail.curve.segments;
  return { segments: divideLife({ segments }, detail.lifeDivisor) };
}
