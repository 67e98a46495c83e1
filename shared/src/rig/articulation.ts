/** How freely the end of a stay can turn. */
export type Articulation = 'both-planes' | 'one-plane' | 'none' | 'seized';

const DEGREE = Math.PI / 180;

/**
 * Standing misalignment assumed at a fixed end, radians, until a surveyor measures it: 0 where the end turns in both
 * planes, 0.25 degree in one, 0.5 where it does not turn, 1 where it should and is seized.
 * Engineering estimates without a source, editable, and shown as estimates.
 */
export const MISALIGNMENT_RAD: Readonly<Record<Articulation, number>> = {
  'both-planes': 0,
  'one-plane': 0.25 * DEGREE,
  none: 0.5 * DEGREE,
  seized: DEGREE,
};
