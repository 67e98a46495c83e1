import {
  pointOnMast,
  spreaderTip,
  type MastGeometry,
  type PositionGeometry,
  type RigGeometry,
  type RigPoint,
} from '../geometry.js';
import type { Side } from '../positions.js';

/** A place whose run is wanted. */
export interface PlaceOnRig {
  kind: string;
  side: Side;
  mast: string;
  /** True on a rig whose cap shrouds end at each spreader (V1, V2, V3 as separate pieces). */
  discontinuous?: boolean;
}

/** Everything a run is drawn from. */
interface Setting {
  rig: RigGeometry;
  mast: MastGeometry;
  place: PlaceOnRig;
  lengthM: number;
}

type Run = (setting: Setting) => PositionGeometry | null;

/**
 * Where a stay of a kind usually runs on a rig, to be corrected by whoever has measured it. Shares of heights and
 * lengths are common practice without a source.
 *
 * @returns null for a kind that has no run of its own (halyards, sheets), a mast the rig does not have, or a place the
 *   rig cannot have (a bobstay without a bowsprit)
 */
export function suggestPositionGeometry(place: PlaceOnRig, rig: RigGeometry): PositionGeometry | null {
  const mast = rig.masts.find(({ key }) => key === place.mast);
  if (!mast) return null;
  return RUNS[place.kind]?.({ rig, mast, place, lengthM: rig.deckLengthM }) ?? null;
}

const RUNS: Readonly<Record<string, Run>> = {
  forestay: (at) => straight(foremost(at) ? bow(at.rig) : aheadOf(at), hounds(at)),
  'inner-forestay': (at) => {
    if (!foremost(at)) return straight(aheadOf(at), onHounds(at, 0.75));
    const lower = at.rig.bowspritTip ? deck(0) : deck(0.28 * at.mast.footAftM);
    return straight(lower, onHounds(at, 0.78));
  },
  babystay: (at) => straight(deck(at.mast.footAftM - 0.14 * at.lengthM), spreaderRoot(at, 0, 0.5)),
  jumper: (at) => {
    const strut = onHounds(at, 0.9);
    const reachM = 0.04 * at.mast.heightM;
    const tip = {
      aftM: strut.aftM - reachM,
      starboardM: signed(at.place.side, reachM),
      upM: strut.upM,
    };
    return { lower: onHounds(at, 0.75), via: [tip], upper: pointOnMast(at.mast, at.mast.heightM) };
  },
  'cap-shroud': (at) => {
    const tips = at.mast.spreaders.map((spreader) => spreaderTip(at.mast, spreader, at.place.side));
    if (at.place.discontinuous && tips.length > 1) return straight(chainplate(at), tips[0]);
    return { lower: chainplate(at), via: tips, upper: hounds(at) };
  },
  'vertical-2': (at) => vertical(at, 0),
  'vertical-3': (at) => vertical(at, 1),
  lower: (at) => straight(chainplate(at), spreaderRoot(at, 0, 0.5)),
  'lower-forward': (at) => straight(chainplate(at, -0.04), spreaderRoot(at, 0, 0.5)),
  'lower-aft': (at) => straight(chainplate(at, 0.04), spreaderRoot(at, 0, 0.5)),
  intermediate: (at) => {
    const first = at.mast.spreaders[0];
    const root = spreaderRoot(at, 1, 0.75);
    if (!first) return straight(chainplate(at), root);
    const tip = spreaderTip(at.mast, first, at.place.side);
    return at.place.discontinuous ? straight(tip, root) : { lower: chainplate(at), via: [tip], upper: root };
  },
  'intermediate-3': (at) => {
    const second = at.mast.spreaders[1];
    return second ? straight(spreaderTip(at.mast, second, at.place.side), spreaderRoot(at, 2, 0.9)) : null;
  },
  diamond: (at) => {
    const first = at.mast.spreaders[0];
    if (!first) return null;
    return {
      lower: onHounds(at, 0.12),
      via: [spreaderTip(at.mast, first, at.place.side)],
      upper: onHounds(at, 0.9),
    };
  },
  backstay: (at) => straight(deck(sternOf(at)), pointOnMast(at.mast, at.mast.heightM)),
  'backstay-leg': (at) => {
    const lower = { ...deck(sternOf(at)), starboardM: signed(at.place.side, 0.3 * at.rig.beamM) };
    const head = pointOnMast(at.mast, at.mast.heightM);
    return straight(lower, between(deck(sternOf(at)), head, 0.2));
  },
  'running-backstay': (at) => straight(quarter(at), onHounds(at, 0.8)),
  checkstay: (at) => straight(quarter(at), onHounds(at, 0.5)),
  triatic: ({ rig }) => {
    const [first, second] = rig.masts;
    if (!second) return null;
    return straight(pointOnMast(first, first.heightM), pointOnMast(second, second.heightM));
  },
  bobstay: ({ rig, lengthM }) =>
    rig.bowspritTip &&
    straight({ aftM: 0.02 * lengthM, starboardM: 0, upM: -0.09 * lengthM }, rig.bowspritTip),
  'whisker-stay': ({ rig, place, lengthM }) =>
    rig.bowspritTip &&
    straight(
      { aftM: 0.07 * lengthM, starboardM: signed(place.side, 0.22 * rig.beamM), upM: -0.01 * lengthM },
      rig.bowspritTip,
    ),
};

function straight(lower: RigPoint, upper: RigPoint): PositionGeometry {
  return { lower, via: [], upper };
}

/** V2 runs from the first spreader's tip, V3 from the second's, to the next tip or the hounds. */
function vertical(at: Setting, from: number): PositionGeometry | null {
  const below = at.mast.spreaders[from];
  if (!below) return null;
  const above = at.mast.spreaders[from + 1];
  const last = above === undefined || from + 2 >= at.mast.spreaders.length;
  const lower = spreaderTip(at.mast, below, at.place.side);
  const via = above ? [spreaderTip(at.mast, above, at.place.side)] : [];
  return last ? { lower, via, upper: hounds(at) } : straight(lower, via[0]);
}

function foremost({ rig, mast }: Setting): boolean {
  return rig.masts[0]?.key === mast.key;
}

function bow(rig: RigGeometry): RigPoint {
  return rig.bowspritTip ?? deck(0);
}

/** A mast behind another has its stay to the deck between the two. */
function aheadOf(at: Setting): RigPoint {
  return deck(at.mast.footAftM - 0.3 * at.mast.heightM);
}

function sternOf({ rig, mast, lengthM }: Setting): number {
  const next = rig.masts[rig.masts.findIndex(({ key }) => key === mast.key) + 1];
  // With a mast behind it, the backstay comes down ahead of that mast.
  return next ? next.footAftM - 0.04 * lengthM : Math.max(lengthM, mast.footAftM + 0.04 * lengthM);
}

function hounds({ mast }: Setting): RigPoint {
  return pointOnMast(mast, mast.houndsHeightM);
}

function onHounds({ mast }: Setting, share: number): RigPoint {
  return pointOnMast(mast, share * mast.houndsHeightM);
}

/** Root of a pair of spreaders, or the share of the hounds where the mast has no such pair. */
function spreaderRoot(at: Setting, index: number, otherwise: number): RigPoint {
  const spreader = at.mast.spreaders[index];
  return spreader ? pointOnMast(at.mast, spreader.heightM) : onHounds(at, otherwise);
}

/** @param aftShare of the length, aft of the mast's foot */
function chainplate({ mast, rig, lengthM, place }: Setting, aftShare = 0): RigPoint {
  const swept = mast.spreaders[0]?.sweepDegrees ? 0.03 : 0;
  return {
    aftM: mast.footAftM + (aftShare + swept) * lengthM,
    starboardM: signed(place.side, 0.46 * rig.beamM * fullness(mast.footAftM / lengthM)),
    upM: 0,
  };
}

/** A deck is narrower towards the ends: full at the middle, a bit over half at the stern, nothing at the stem. */
function fullness(share: number): number {
  const x = Math.min(1, Math.max(0, share));
  return x < 0.5 ? 1 - (1 - 2 * x) ** 2 : 1 - 0.4 * (2 * x - 1) ** 2;
}

function quarter(at: Setting): RigPoint {
  const aftM = Math.min(sternOf(at), at.mast.footAftM + 0.4 * at.lengthM);
  return {
    ...deck(aftM),
    starboardM: signed(at.place.side, 0.4 * at.rig.beamM * fullness(aftM / at.lengthM)),
  };
}

function deck(aftM: number): RigPoint {
  return { aftM, starboardM: 0, upM: 0 };
}

function between(from: RigPoint, to: RigPoint, share: number): RigPoint {
  return {
    aftM: from.aftM + share * (to.aftM - from.aftM),
    starboardM: from.starboardM + share * (to.starboardM - from.starboardM),
    upM: from.upM + share * (to.upM - from.upM),
  };
}

function signed(side: Side, metres: number): number {
  if (side === 'centre') return 0;
  return side === 'port' ? -metres : metres;
}
