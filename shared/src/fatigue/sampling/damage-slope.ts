import { GRID_SIZE } from '../uncertainty/damage-on-grid.js';
import type { DamageGrid } from '../uncertainty/damage-grid.js';

/**
 * Slope of the damage of a record: by how many per cent it grows when ranges grow by one per cent. Between the slopes
 * of a curve of two, by how much of the damage falls on each.
 *
 * @param grid damage at nine factors
 * @returns 0 for a record without damage
 */
export function damageSlope(grid: Pick<DamageGrid, 'total' | 'lnStep'>): number {
  const middle = (GRID_SIZE - 1) / 2;
  const below = grid.total[middle - 1];
  const above = grid.total[middle + 1];
  return below > 0 && above > 0 ? Math.log(above / below) / (2 * grid.lnStep) : 0;
}
