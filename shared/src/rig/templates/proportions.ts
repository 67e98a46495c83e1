import type { RigTemplateKey } from './template-keys.js';

/** Proportions of a mast; lengths as shares of the length on deck. */
export interface MastProportions {
  key: string;
  /** Foot aft of the stem. */
  foot: number;
  /** Foot to masthead. */
  height: number;
  /** Hounds as a share of the mast's own height. */
  hounds: number;
  /** Degrees aft of plumb. */
  rake: number;
  /** Pairs of spreaders. */
  spreaders: number;
  /** Sweep of the spreaders, degrees. */
  sweep: number;
  stayed: boolean;
}

/** Proportions of a rig. */
export interface RigProportions {
  /** Length of the bowsprit outside the stem; 0 without one. */
  bowsprit: number;
  masts: MastProportions[];
}

/** All numbers: common practice, no source. They place lines on a drawing until somebody measures. */
const PROPORTIONS: Readonly<Record<RigTemplateKey, RigProportions>> = {
  'masthead-sloop': { bowsprit: 0, masts: [mast('main', 0.4, 1.3, { spreaders: 2 })] },
  'fractional-sloop': {
    bowsprit: 0,
    masts: [mast('main', 0.39, 1.38, { hounds: 0.89, spreaders: 2, sweep: 20, rake: 2 })],
  },
  cutter: { bowsprit: 0.14, masts: [mast('main', 0.42, 1.25, { spreaders: 2 })] },
  ketch: {
    bowsprit: 0.1,
    masts: [
      mast('main', 0.36, 1.15, { spreaders: 1 }),
      mast('mizzen', 0.8, 0.8, { spreaders: 1, hounds: 0.95 }),
    ],
  },
  yawl: {
    bowsprit: 0,
    masts: [
      mast('main', 0.38, 1.25, { spreaders: 2 }),
      mast('mizzen', 0.92, 0.55, { spreaders: 0, hounds: 0.9 }),
    ],
  },
  schooner: {
    bowsprit: 0.18,
    masts: [
      mast('fore', 0.27, 0.95, { spreaders: 1, rake: 2 }),
      mast('main', 0.6, 1.05, { spreaders: 1, rake: 3 }),
    ],
  },
  'unstayed-mizzen': {
    bowsprit: 0,
    masts: [
      mast('main', 0.38, 1.25, { spreaders: 1 }),
      mast('mizzen', 0.94, 0.6, { spreaders: 0, stayed: false }),
    ],
  },
};

/** Proportions of a template. */
export function rigProportions(template: RigTemplateKey): RigProportions {
  return PROPORTIONS[template];
}

function mast(
  key: string,
  foot: number,
  height: number,
  rest: Partial<Omit<MastProportions, 'key' | 'foot' | 'height'>>,
): MastProportions {
  return { key, foot, height, hounds: 1, rake: 1, spreaders: 1, sweep: 0, stayed: true, ...rest };
}
