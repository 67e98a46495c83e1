import type { EndBending } from './detail-model.js';

/**
 * Range that bending adds between the low and the high stress of one cycle:
 * 2 * sqrt(E) * |(misalignment + swing) * sqrt(high) - misalignment * sqrt(low)|.
 * The angle is the fixed misalignment at the low load and misalignment plus swing at the high load.
 *
 * @param lowMpa low tensile stress, MPa; compression counts as slack
 * @param highMpa high tensile stress, MPa
 * @returns range, MPa, to be added to high - low
 */
export function endBendingRangeMpa(lowMpa: number, highMpa: number, bending: EndBending): number {
  const low = Math.sqrt(Math.max(lowMpa, 0));
  const high = Math.sqrt(Math.max(highMpa, 0));
  const { fixedMisalignmentRad, swingRad, youngMpa } = bending;
  return (
    2 * Math.sqrt(youngMpa) * Math.abs((fixedMisalignmentRad + swingRad) * high - fixedMisalignmentRad * low)
  );
}
