import type { ReferenceCurve } from '../curves/curve.js';
import { UNPUBLISHED_SD_LOG10_N } from '../curves/shift-to-mean.js';
import type { DetailModel } from '../damage/detail-model.js';
import type { LoadSpectrum } from '../rainflow/load-spectrum.js';
import { lnSdOfCov } from '../statistics/lognormal.js';
import { curveLnSd } from './curve-ln-sd.js';
import { damageGrid } from './damage-grid.js';
import type { DamageShare, DetailRecord } from './life-record.js';
import { meanDetail } from './mean-detail.js';
import { stressModelCov } from './stress-model-cov.js';

/** What the record of a detail is made of. */
export interface DetailRecordInput {
  key: string;
  name: string;
  model: Omit<DetailModel, 'curve'> & { curve: ReferenceCurve };
  modelSdLog10N: number;
  designFatigueFactor: number;
  /** All logs of its channel together, see wholeHistory. */
  spectrum: LoadSpectrum;
  /** Day number of each day of the use record, in its order. */
  dayNumbers: readonly number[];
  /** Largest doubt about the gain of its load cell, and that of its load basis: how wide the grid has to be. */
  gainCov: number;
  basisCov: number;
  /** How the damage of each day splits over the groups; all in group 0 where left out. */
  shares?: readonly DamageShare[];
  /** Calibration period of each day; all in period 0 where left out. */
  calibrationOfDay?: readonly number[];
  posted?: readonly boolean[];
  /** None where left out. */
  sampling?: { factor: number; lnSd: number };
}

/**
 * The record of a detail with its doubts, from its model and the spectrum of its channel: shifted to the mean curve,
 * worked out at nine factors, day by day.
 *
 * @throws RangeError for negative doubts
 * @throws MeanAboveUltimateError when a load reaches the ultimate of the detail's mean rule
 */
export function detailRecord(input: DetailRecordInput): DetailRecord {
  const { key, name, model, dayNumbers, gainCov, basisCov } = input;
  const stressCov = stressModelCov(model.stressConcentration);
  const lnSd = Math.hypot(lnSdOfCov(gainCov), lnSdOfCov(basisCov), lnSdOfCov(stressCov));
  const { level, k, sdLog10N } = model.curve;
  const shifted = level === 'mean-minus-k-sd' || level === 'fractile-95-75';
  return {
    key,
    name,
    grid: damageGrid(input.spectrum, meanDetail(model), dayNumbers, lnSd),
    shares: input.shares ?? dayNumbers.map((_, day) => ({ day, group: 0, share: 1 })),
    calibrationOfDay: input.calibrationOfDay ?? dayNumbers.map(() => 0),
    ...(input.posted === undefined ? {} : { posted: input.posted }),
    designOverMean: shifted ? 10 ** (k * (sdLog10N ?? UNPUBLISHED_SD_LOG10_N)) : 1,
    designFatigueFactor: input.designFatigueFactor,
    curveLnSd: curveLnSd(model.curve, input.modelSdLog10N),
    stressCov,
    sampling: input.sampling ?? { factor: 1, lnSd: 0 },
  };
}
