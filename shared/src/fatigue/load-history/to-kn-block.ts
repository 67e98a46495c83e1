import { KN_PER, type ForceUnit } from '../../units/force.js';

/**
 * A block of forces in kilonewtons: `toKn` for each of the first `n` values.
 *
 * @param values forces in `unit`
 * @param target where the kilonewtons go
 */
export function toKnBlock(values: Float64Array, target: Float64Array, n: number, unit: ForceUnit): void {
  const divisor = unit === 'N' ? 1000 : unit === 'daN' ? 100 : 0;
  if (divisor > 0) {
    for (let i = 0; i < n; i++) target[i] = values[i] / divisor;
    return;
  }
  const factor = KN_PER[unit];
  for (let i = 0; i < n; i++) target[i] = values[i] * factor;
}
