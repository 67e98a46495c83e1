import type { MastGeometry, RigGeometry } from '../geometry.js';
import { rigProportions, type RigProportions } from './proportions.js';
import type { RigTemplateKey } from './template-keys.js';

/** Sizes a person may know of a vessel; the rest is drawn from them. */
export interface KnownSizes {
  /** Length on deck, m; null stands for ten metres. */
  lengthM: number | null;
  /** Pairs of spreaders of each stayed mast; left out: as the template has them. */
  spreaders?: number;
}

const LENGTH_WHEN_UNKNOWN_M = 10;
const HIGHEST_SPREADER_TAPER = 0.25;

/**
 * A plausible hull and rig of a type, to be corrected by whoever has measured it. Every proportion is common practice
 * without a source; nothing that is worked out of loads depends on it.
 *
 * @throws RangeError for a length that is not above zero
 */
export function suggestGeometry(template: RigTemplateKey, sizes: KnownSizes): RigGeometry {
  const lengthM = sizes.lengthM ?? LENGTH_WHEN_UNKNOWN_M;
  if (!(lengthM > 0)) throw new RangeError('The length must be above zero.');
  const proportions = rigProportions(template);
  return {
    deckLengthM: rounded(lengthM),
    beamM: rounded(beamOf(lengthM)),
    bowspritTip:
      proportions.bowsprit > 0
        ? { aftM: -rounded(proportions.bowsprit * lengthM), starboardM: 0, upM: rounded(0.03 * lengthM) }
        : null,
    masts: proportions.masts.map((mast) => mastOf(mast, lengthM, sizes.spreaders)),
  };
}

function mastOf(mast: RigProportions['masts'][number], lengthM: number, wanted?: number): MastGeometry {
  const heightM = mast.height * lengthM;
  const houndsHeightM = heightM * mast.hounds;
  const pairs = mast.stayed ? (wanted ?? mast.spreaders) : 0;
  const reachM = 0.42 * beamOf(lengthM);
  return {
    key: mast.key,
    footAftM: rounded(mast.foot * lengthM),
    footUpM: 0,
    heightM: rounded(heightM),
    houndsHeightM: rounded(houndsHeightM),
    rakeDegrees: mast.rake,
    stayed: mast.stayed,
    spreaders: Array.from({ length: pairs }, (_, index) => ({
      heightM: rounded((houndsHeightM * (index + 1)) / (pairs + 1)),
      lengthM: rounded(reachM * (1 - (HIGHEST_SPREADER_TAPER * index) / Math.max(1, pairs))),
      sweepDegrees: mast.sweep,
    })),
  };
}

/** Beams grow slower than lengths: about a third at ten metres, a quarter at thirty. */
function beamOf(lengthM: number): number {
  return 0.33 * lengthM * (10 / Math.max(lengthM, 5)) ** 0.25;
}

function rounded(metres: number): number {
  return Math.round(metres * 100) / 100;
}
