import { threadSizeFactor } from '../fatigue/curves/thread-size-factor.js';
import type { ReferenceCurve } from '../fatigue/curves/curve.js';
import type { PartDetail } from './part-detail.js';

/** What a person decided about a detail instead of its defaults; null leaves the default. */
export interface ChosenInputs {
  curve: Pick<
    ReferenceCurve,
    'id' | 'version' | 'name' | 'measure' | 'environment' | 'threadSize' | 'selectable'
  > | null;
  designFatigueFactor: number | null;
}

/**
 * A detail with a person's choices laid over its defaults. The inputs of the default stay where the choice says
 * nothing: area, bending, surroundings. A curve of free corrosion in sea water holds the surroundings already, so the
 * life divisor of the default is dropped with it (the surroundings are charged once). A thread keeps the size rule of
 * the chosen curve, or none where that curve has none.
 *
 * A curve of another measure than the default's, or one that is for comparison only, is not used: the factor from load
 * to stress would mean something else. The detail then keeps its default and says so among its estimates.
 *
 * @param detail the detail by its defaults
 * @param choice what was decided
 * @param defaultMeasure measure of the default curve; null for a detail that is not assessed
 * @param threadDiameterMm nominal diameter, for details on a thread; null elsewhere
 */
export function chooseDetail(
  detail: PartDetail,
  choice: ChosenInputs,
  defaultMeasure: ReferenceCurve['measure'] | null,
  threadDiameterMm: number | null = null,
): PartDetail {
  const chosen = withFactor(detail, choice.designFatigueFactor);
  const { curve } = choice;
  if (curve === null || chosen.inputs === null) return chosen;
  if (curve.measure !== defaultMeasure || !curve.selectable) {
    return {
      ...chosen,
      estimates: [
        ...chosen.estimates,
        `The chosen curve ${curve.name} does not fit this detail any more; the default is used.`,
      ],
    };
  }
  const inSeaWater = curve.environment === 'seawater-free-corrosion';
  const onThread = threadDiameterMm !== null;
  return {
    ...chosen,
    curveId: curve.id,
    curveVersion: curve.version,
    inputs: {
      ...chosen.inputs,
      lifeDivisor: inSeaWater ? 1 : chosen.inputs.lifeDivisor,
      sizeFactor: onThread
        ? curve.threadSize === null
          ? 1
          : threadSizeFactor(threadDiameterMm, curve.threadSize)
        : chosen.inputs.sizeFactor,
    },
    explanation: [
      `Assessed on ${curve.name}, as chosen.`,
      ...(inSeaWater ? ['That curve holds salt water already: life is not divided for it again.'] : []),
      `The default: ${chosen.explanation}`,
    ].join(' '),
    estimates: isAboutCurve(detail) ? chosen.estimates.slice(1) : chosen.estimates,
  };
}

function withFactor(detail: PartDetail, factor: number | null): PartDetail {
  if (factor === null || factor === detail.designFatigueFactor) return detail;
  return {
    ...detail,
    designFatigueFactor: factor,
    explanation: `Design fatigue factor ${factor}, as chosen instead of ${detail.designFatigueFactor}. ${detail.explanation}`,
  };
}

/** Wires and terminals name the doubt about their curve first among their estimates (see default-details). */
function isAboutCurve({ kind, estimates }: PartDetail): boolean {
  return (
    estimates.length > 0 && (kind === 'free-length' || kind === 'upper-terminal' || kind === 'lower-terminal')
  );
}
