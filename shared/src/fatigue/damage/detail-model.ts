import type { Curve, ReferenceCurve } from '../curves/curve.js';
import type { MeanLoadRule } from './mean-load.js';

/** Bending at a fixed end, from two angles a surveyor can judge. */
export interface EndBending {
  /** Standing angle between the end and the stay's line, radians. */
  fixedMisalignmentRad: number;
  /** Further angle reached at the high load of a cycle, radians. */
  swingRad: number;
  /** Young's modulus of the stay as built (strand, not wire), MPa. */
  youngMpa: number;
}

/** Everything that turns the load of a part into damage at one place on it. */
export interface DetailModel {
  /** Measure of the curve per kN: 1000 / area in mm2 gives MPa, 1 / breaking load in kN gives load over breaking load. */
  factor: number;
  /** Stress concentration on the axial stress, 1 for none. */
  stressConcentration: number;
  /** Multiplies the range for thickness or thread size, 1 for none. */
  sizeFactor: number;
  /** Divides the life for surroundings harsher than the curve's: 1 matching, 2 drained, 3 standing water. */
  lifeDivisor: number;
  /** 'none' continues the lowest segment to zero: no fatigue limit is trusted in salt air. */
  cutOff: 'as-curve' | 'none';
  curve: Curve | ReferenceCurve;
  mean: MeanLoadRule;
  endBending: EndBending | null;
}
