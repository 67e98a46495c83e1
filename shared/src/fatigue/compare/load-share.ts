/** Change of stiffness above which recorded loads are no longer quite those of the new part. Common practice, no source. */
export const STIFFNESS_CAVEAT = 0.15;

/** How a part of another stiffness shares the load with its neighbours. */
export interface LoadShare {
  /** New stiffness over old. */
  stiffnessRatio: number;
  /** Multiplies the recorded load ranges; 1 where the neighbours are not known. */
  loadFactor: number;
  /** Printed on the sheet; null where the stiffness is about the same. */
  caveat: string | null;
}

/**
 * What a part of another stiffness draws of the load: (new / old) * (sum old / sum new) over the parallel load paths.
 * Pretension stays at the tune target.
 *
 * @param currentKn stiffness E * A of the part the loads were recorded on, kN
 * @param candidateKn of the new part, kN
 * @param parallelKn of all load paths beside it together, without the part itself, kN; null: not known
 * @throws RangeError for a stiffness that is not above zero
 * Source: stiffness shares of parallel springs, first order (derived).
 */
export function loadShare(currentKn: number, candidateKn: number, parallelKn: number | null): LoadShare {
  if (!(currentKn > 0 && candidateKn > 0) || (parallelKn !== null && !(parallelKn >= 0))) {
    throw new RangeError('A stiffness must be above zero.');
  }
  const stiffnessRatio = candidateKn / currentKn;
  const loadFactor =
    parallelKn === null ? 1 : (stiffnessRatio * (parallelKn + currentKn)) / (parallelKn + candidateKn);
  if (Math.abs(stiffnessRatio - 1) <= STIFFNESS_CAVEAT) return { stiffnessRatio, loadFactor, caveat: null };
  const change = `${Math.round(Math.abs(stiffnessRatio - 1) * 100)} % ${stiffnessRatio > 1 ? 'stiffer' : 'softer'}`;
  return {
    stiffnessRatio,
    loadFactor,
    caveat:
      parallelKn === null
        ? `It is ${change} than the part the loads were recorded on and would draw ${stiffnessRatio > 1 ? 'more' : 'less'} load. How much is not known without the stiffness of its neighbours: the recorded loads are used as they are.`
        : `It is ${change} than the part the loads were recorded on. The recorded ranges are multiplied by ${loadFactor.toFixed(2)}, a first-order estimate.`,
  };
}
