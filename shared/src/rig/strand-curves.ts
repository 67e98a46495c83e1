import type { ReferenceCurve } from '../fatigue/curves/curve.js';
import type { DetailModel } from '../fatigue/damage/detail-model.js';
import type { ConstructionKind } from './constructions.js';

/**
 * Curves of the reference data that speak of wire of this kind, from which people see how far the standards lie apart.
 * None stands for rod and fibre: rod has one family of curves, fibre none.
 */
export function strandCurveIds(construction: ConstructionKind): readonly string[] {
  switch (construction) {
    case '1x19':
    case '1x19-compacted':
      return [
        'en-1993-1-11-150',
        'dnv-os-e301-spiral-rope',
        'api-rp-2sk-spiral-strand',
        'api-rp-2sk-stranded-rope',
      ];
    case '7x19':
    case '7x7':
    case '6x7-fibre-core':
      return ['dnv-os-e301-stranded-rope', 'api-rp-2sk-stranded-rope', 'asce-19-six-strand-rope'];
    case 'rod':
    case 'fibre':
      return [];
  }
}

/** What the free length of a wire is assessed with besides the curve. */
export interface FreeLength {
  metallicAreaMm2: number;
  breakingLoadKn: number;
  lifeDivisor: number;
}

/**
 * The free length of a wire on one of the strand curves: in MPa on the metallic area, or in load over breaking load,
 * as the curve is measured. Where the curve contains the mean load, each cycle brings its own.
 *
 * @throws RangeError for a curve that is measured on neither
 */
export function freeLengthOn(curve: ReferenceCurve, wire: FreeLength): DetailModel {
  if (curve.measure !== 'stress-metallic' && curve.measure !== 'load-ratio') {
    throw new RangeError(`${curve.name} is no curve of strand.`);
  }
  return {
    curve,
    factor: curve.measure === 'load-ratio' ? 1 / wire.breakingLoadKn : 1000 / wire.metallicAreaMm2,
    stressConcentration: 1,
    sizeFactor: 1,
    lifeDivisor: wire.lifeDivisor,
    cutOff: 'none',
    mean: { kind: 'none' },
    endBending: null,
  };
}
