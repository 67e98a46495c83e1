import type { LoadBasis } from '../life/governing-rule.js';

/**
 * Doubt about carrying a load from the sensor to the part, as coefficient of variation of the load: none where it is
 * measured on the part or in line with it, 0.15 where the same part on the other side is measured.
 * The 0.15 is an engineering estimate without a source.
 *
 * @throws RangeError without a load basis: such a part has no loads to doubt
 */
export function basisCov(basis: LoadBasis): number {
  if (basis === 'none') throw new RangeError('A part without a load basis has no loads.');
  return basis === 'mirrored' ? 0.15 : 0;
}
