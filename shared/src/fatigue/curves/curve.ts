/**
 * One straight stretch of a fatigue curve on log-log paper: N = 10^log10a * S^-m.
 * S is a full range (peak to trough) in the curve's own measure, MPa or load over breaking load.
 */
export interface CurveSegment {
  /** Lowest S this segment serves; a range exactly on it belongs to this segment. */
  above: number;
  /** Inverse slope: life falls by S^m. */
  m: number;
  /** log10 of the intercept a. */
  log10a: number;
}

/**
 * A fatigue curve as segments from high to low ranges. A range takes the first segment whose `above` is not
 * greater than it; a range below all of them does no damage (a cut-off).
 */
export interface Curve {
  segments: CurveSegment[];
}

/** What the abscissa of a curve means. Stresses are ranges in MPa on the named area. */
export type CurveMeasure =
  'stress-nominal' | 'stress-metallic' | 'stress-thread' | 'stress-shear' | 'load-ratio';

/** Where a curve lies in the scatter of its tests. */
export type CurveLevel = 'mean' | 'mean-minus-k-sd' | 'fractile-95-75' | 'unknown';

/** Surroundings in which a curve holds. */
export type CurveEnvironment =
  'air' | 'corrosion-protected' | 'seawater-cathodic-protection' | 'seawater-free-corrosion';

/** How sure we are of the numbers of a curve or table. */
export type Provenance = 'published' | 'published, secondary' | 'from memory' | 'estimate' | 'derived';

/** How a curve treats the mean load of a cycle. */
export type CurveMeanLoad =
  /** The tests already contain a tensile mean (or high residual stress): any further mean rule is refused. */
  | { kind: 'none'; reason: string }
  /** log10 K = log10a - perMeanRatio * Lm, Lm = mean over breaking load, clipped to [minRatio, maxRatio]. */
  | { kind: 'load-ratio-exponent'; perMeanRatio: number; minRatio: number; maxRatio: number; reason: string }
  /** Measured at a stated stress ratio R = low / high, so that Goodman, Gerber or Walker may refer to it. */
  | { kind: 'rule-allowed'; referenceR: number; reason: string };

/** Range of S in which the source supports a curve; null where the source sets no bound. */
export interface CurveValidity {
  minRange: number | null;
  maxRange: number | null;
  note: string;
}

/** A curve of the reference data: named, versioned, immutable, with its source. */
export interface ReferenceCurve extends Curve {
  id: string;
  version: number;
  name: string;
  /** Kind of part the tests were made on, as its source calls it in plain words. */
  appliesTo: string;
  measure: CurveMeasure;
  level: CurveLevel;
  /** Standard deviations of log10 N between this curve and the mean one; 0 where the level is unknown. */
  k: number;
  /** Published standard deviation of log10 N at a given range; null where none is published. */
  sdLog10N: number | null;
  environment: CurveEnvironment;
  meanLoad: CurveMeanLoad;
  /** Ranges of parts thicker than referenceMm are raised by (thickness / referenceMm)^exponent. */
  thickness: { exponent: number; referenceMm: number } | null;
  /** Strength of threads larger than referenceMm falls by (referenceMm / diameter)^exponent. */
  threadSize: { exponent: number; referenceMm: number } | null;
  /** Range below which the source counts no damage; null where it has none. */
  cutOffRange: number | null;
  validity: CurveValidity;
  source: string;
  provenance: Provenance;
  provenanceNote: string;
  /** How far the tests behind the curve are from a yacht's rigging. */
  analogyNote: string;
  /** False for curves shown for comparison only, never offered as the curve of a part. */
  selectable: boolean;
}
