import type { Curve } from './curve.js';

/**
 * The elementary form of Miner's rule: the steepest-loaded (first) segment continued to zero, no knee and no cut-off.
 * The most cautious of the variants, for corrosion.
 *
 * @throws RangeError for a curve without segments
 * Source: Palmgren-Miner in its original form; use in corrosion is common practice.
 */
export function elementary(curve: Curve): Curve {
  const first = curve.segments.at(0);
  if (first === undefined) throw new RangeError('A curve needs at least one segment.');
  return { segments: [{ ...first, above: 0 }] };
}
