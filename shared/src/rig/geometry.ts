import type { Side } from './positions.js';

/**
 * A point of the rig, in metres. The origin is the stem head at deck level, on the centre line: aft, to starboard and
 * upwards count positive, so a bowsprit ends at a negative `aftM` and the port side has a negative `starboardM`.
 */
export interface RigPoint {
  aftM: number;
  starboardM: number;
  upM: number;
}

/** One pair of spreaders. */
export interface SpreaderGeometry {
  /** Height of the root above the mast's foot, along the mast, m. */
  heightM: number;
  /** From the mast's centre line to the tip, m. */
  lengthM: number;
  /** Tips swept aft by this angle, degrees. */
  sweepDegrees: number;
}

/** One mast; the stays refer to it by `key`, which is the `mast` of a position ("main", "mizzen", "fore"). */
export interface MastGeometry {
  key: string;
  /** Foot at deck level: distance aft of the stem head, m. */
  footAftM: number;
  /** Height of the foot above deck level at the stem, m. */
  footUpM: number;
  /** From foot to masthead, along the mast, m. */
  heightM: number;
  /** From foot to the hounds, where forestay and cap shrouds end; equal to `heightM` on a masthead rig, m. */
  houndsHeightM: number;
  /** Masthead aft of plumb, degrees. */
  rakeDegrees: number;
  /** From the lowest up; empty on an unstayed or pole mast. */
  spreaders: SpreaderGeometry[];
  /** False where nothing but its own foot holds the mast up. */
  stayed: boolean;
}

/** Hull and masts of one vessel, as far as the standing rigging needs them. */
export interface RigGeometry {
  /** Stem head to the aftermost chainplate or transom, m. */
  deckLengthM: number;
  beamM: number;
  /** Tip of the bowsprit; null without one. */
  bowspritTip: RigPoint | null;
  /** From the bow aft. */
  masts: MastGeometry[];
}

/** Where one stay runs: from its lower end over spreader tips or struts to its upper end. */
export interface PositionGeometry {
  /** Chainplate or other lower attachment. */
  lower: RigPoint;
  /** Spreader tips and struts the stay bears on, from the lowest up. */
  via: RigPoint[];
  /** Tang, hounds or masthead. */
  upper: RigPoint;
}

/**
 * A point on a mast's centre line.
 *
 * @param heightM above the foot, along the mast
 */
export function pointOnMast(mast: MastGeometry, heightM: number): RigPoint {
  const rake = radians(mast.rakeDegrees);
  return {
    aftM: mast.footAftM + heightM * Math.sin(rake),
    starboardM: 0,
    upM: mast.footUpM + heightM * Math.cos(rake),
  };
}

/**
 * Tip of a spreader on one side; on side 'centre' the root.
 */
export function spreaderTip(mast: MastGeometry, spreader: SpreaderGeometry, side: Side): RigPoint {
  const root = pointOnMast(mast, spreader.heightM);
  if (side === 'centre') return root;
  const sweep = radians(spreader.sweepDegrees);
  const out = spreader.lengthM * Math.cos(sweep);
  return {
    aftM: root.aftM + spreader.lengthM * Math.sin(sweep),
    starboardM: side === 'port' ? -out : out,
    upM: root.upM,
  };
}

/**
 * Length of a stay along its path from lower to upper end, pin to pin: the sum of its straight runs.
 *
 * @returns m
 */
export function stayLengthM({ lower, via, upper }: PositionGeometry): number {
  const path = [lower, ...via, upper];
  let length = 0;
  for (let index = 1; index < path.length; index += 1) length += distanceM(path[index - 1], path[index]);
  return length;
}

/**
 * The same stay on the other side of the vessel.
 */
export function mirrored({ lower, via, upper }: PositionGeometry): PositionGeometry {
  return { lower: mirroredPoint(lower), via: via.map(mirroredPoint), upper: mirroredPoint(upper) };
}

/** Straight distance between two points, m. */
export function distanceM(from: RigPoint, to: RigPoint): number {
  return Math.hypot(to.aftM - from.aftM, to.starboardM - from.starboardM, to.upM - from.upM);
}

function mirroredPoint({ aftM, starboardM, upM }: RigPoint): RigPoint {
  // Not -0 on the centre line, which would compare unequal to 0 in places.
  return { aftM, starboardM: starboardM === 0 ? 0 : -starboardM, upM };
}

function radians(degrees: number): number {
  return (degrees * Math.PI) / 180;
}
