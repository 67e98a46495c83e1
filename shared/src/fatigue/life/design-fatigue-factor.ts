/** What the design fatigue factor of a detail follows from. */
export interface Inspectability {
  /** True where nobody can see the detail without opening or unstepping. */
  hidden: boolean;
  /** True once it has been opened and looked at. */
  everOpened: boolean;
  /** True while an inspection able to see this detail is in date. */
  inspectionInDate: boolean;
  /** True where the loss of the part drops the mast. */
  lossDropsMast: boolean;
}

/** A design fatigue factor with the reason for it. */
export interface DesignFatigueFactor {
  factor: 3 | 5 | 10;
  words: string;
}

/**
 * Design fatigue factor by consequence and inspectability: 3 while an inspection able to see the detail is in date,
 * 5 when it lapsed or the detail is hidden, 10 when it is hidden, was never opened and its loss drops the mast.
 * An engineering choice without a source; it covers nothing that the curve or the surroundings already cover.
 */
export function designFatigueFactor(detail: Inspectability): DesignFatigueFactor {
  if (detail.inspectionInDate) return { factor: 3, words: 'An inspection able to see it is in date.' };
  if (!detail.hidden) return { factor: 5, words: 'No inspection able to see it is in date.' };
  if (detail.everOpened) return { factor: 5, words: 'It is hidden and was last opened too long ago.' };
  return detail.lossDropsMast
    ? { factor: 10, words: 'It is hidden, was never opened, and its loss drops the mast.' }
    : { factor: 5, words: 'It is hidden and was never opened.' };
}
