import { lnSdOfCov } from '../statistics/lognormal.js';
import { ALL_DAMAGE_DOUBTS, type DamageDoubt, type DamagePaths, damagePaths } from './damage-paths.js';
import { type LifeDraws, lnFactors } from './life-draws.js';
import { MINER_COV, type PartRecord } from './life-record.js';

/** Doubts that act on the failure itself. */
export type FailureDoubt = 'curve' | 'miner';
export type Doubt = DamageDoubt | FailureDoubt;

/** A part with its damage drawn, ready to be asked for probabilities and dates. */
export interface PartLife {
  part: PartRecord;
  draws: LifeDraws;
  /** One per detail of the part, in their order. */
  paths: DamagePaths[];
  /** Spread of ln N of each detail about its mean curve; zeros where the curve is taken as certain. */
  curveLnSds: number[];
  /** ln of the Miner sum at which the part fails, one per draw. */
  lnMinerSums: Float64Array;
}

/**
 * Draws the life of a part: damage of each detail, and the Miner sum at which the part fails.
 *
 * @param doubts which doubts act; all unless given
 */
export function partLife(
  draws: LifeDraws,
  part: PartRecord,
  doubts: ReadonlySet<Doubt> = new Set<Doubt>([...ALL_DAMAGE_DOUBTS, 'curve', 'miner']),
): PartLife {
  const acting = new Set<DamageDoubt>([...ALL_DAMAGE_DOUBTS].filter((doubt) => doubts.has(doubt)));
  const minerCov = part.minerCov ?? MINER_COV;
  return {
    part,
    draws,
    paths: part.details.map((detail) => damagePaths(draws, part, detail, acting)),
    curveLnSds: part.details.map((detail) => (doubts.has('curve') ? detail.curveLnSd : 0)),
    lnMinerSums: doubts.has('miner')
      ? lnFactors(draws.draws, minerCov, draws.streams(`miner ${part.key}`))
      : new Float64Array(draws.draws).fill(-(lnSdOfCov(minerCov) ** 2) / 2),
  };
}
