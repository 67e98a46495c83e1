import type { Provenance } from '../fatigue/curves/curve.js';

/** How the end of a stay is made off. */
export type TerminalKind =
  'swaged' | 'mechanical' | 'poured-socket' | 'ferrule-eye' | 'cold-head' | 'spliced-eye' | 'unknown';

/** A kind of terminal of the reference data. */
export interface Terminal {
  id: TerminalKind;
  version: number;
  name: string;
  fitsKindOfWire: ('strand' | 'rod' | 'fibre')[];
  /** Share of the wire's breaking load the end holds; null where nobody can say. */
  staticFactor: number | null;
  /** Lowest and highest value in use, where sources disagree. */
  staticFactorRange: [number, number] | null;
  fatigueNote: string;
  source: string;
  provenance: Provenance;
  provenanceNote: string;
}
