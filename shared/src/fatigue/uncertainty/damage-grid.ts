import { CycleEvaluator } from '../damage/cycle-evaluator.js';
import { damageOfSpectrum } from '../damage/damage-of-spectrum.js';
import type { DetailModel } from '../damage/detail-model.js';
import type { LoadSpectrum } from '../rainflow/load-spectrum.js';
import { damageOnGrid, GRID_SIZE, lnNode } from './damage-on-grid.js';

/** Half width of the grid in standard deviations of what will be drawn; beyond it the last slope is continued. */
const HALF_WIDTH_SD = 3.5;
const LEAST_STEP = 0.01;

/** Damage of a detail's record at nine factors on its ranges, as a whole and day by day. */
export interface DamageGrid {
  /** Distance of neighbouring factors in natural logarithms. */
  lnStep: number;
  /** Damage of the whole record at each factor. */
  total: Float64Array;
  /** Damage of day d at factor i: byDay[d * GRID_SIZE + i], in the order of the days asked for. */
  byDay: Float64Array;
  /**
   * Natural logarithm of the factor on the range that does what this factor on the *load* does. The same numbers where
   * only ranges matter; others where bending at a fixed end or a mean load has a say.
   */
  lnRangeOfGain: Float64Array;
}

/**
 * Damage of a spectrum on a detail at nine factors on the range. A curve of two slopes has no single exponent, so the
 * doubt about a load acts by working damage out again and interpolating between in logarithms.
 *
 * @param spectrum the record, loads in kN
 * @param detail the detail on its mean curve
 * @param days day numbers the damage is wanted for, in that order; cycles of other days count in the total only
 * @param lnSd standard deviation of ln of everything that will act as a factor on the range or load
 * @throws RangeError for a negative spread
 * @throws MeanAboveUltimateError when a load times a factor reaches the ultimate of the detail's mean rule
 */
export function damageGrid(
  spectrum: LoadSpectrum,
  detail: DetailModel,
  days: readonly number[],
  lnSd: number,
): DamageGrid {
  if (!(lnSd >= 0)) throw new RangeError(`A spread must be zero or more, not ${lnSd}.`);
  const lnStep = Math.max((HALF_WIDTH_SD * lnSd) / ((GRID_SIZE - 1) / 2), LEAST_STEP);
  const rowOfDay = new Map(days.map((day, row) => [day, row]));
  const total = new Float64Array(GRID_SIZE);
  const byDay = new Float64Array(days.length * GRID_SIZE);
  for (let i = 0; i < GRID_SIZE; i++) {
    const factor = Math.exp(lnNode(i, lnStep));
    const result = damageOfSpectrum(spectrum, { ...detail, sizeFactor: detail.sizeFactor * factor });
    total[i] = result.damage;
    for (const { day, damage } of result.byDay) {
      const row = rowOfDay.get(day);
      if (row !== undefined) byDay[row * GRID_SIZE + i] += damage;
    }
  }
  return { lnStep, total, byDay, lnRangeOfGain: rangeOfGain(spectrum, detail, total, lnStep) };
}

function rangeOfGain(
  spectrum: LoadSpectrum,
  detail: DetailModel,
  total: Float64Array,
  lnStep: number,
): Float64Array {
  const nodes = Float64Array.from({ length: GRID_SIZE }, (_, i) => lnNode(i, lnStep));
  if (new CycleEvaluator(detail).dependsOnRangeOnly || total[0] === 0) return nodes;
  return nodes.map((node) => {
    if (node === 0) return 0;
    const damage = damageOfSpectrum(spectrum, { ...detail, factor: detail.factor * Math.exp(node) }).damage;
    return lnRangeForDamage(total, lnStep, damage);
  });
}

/** The inverse of damage by factor, by bisection: damage never falls with the range. */
function lnRangeForDamage(total: Float64Array, lnStep: number, damage: number): number {
  let low = 4 * lnNode(0, lnStep);
  let high = 4 * lnNode(GRID_SIZE - 1, lnStep);
  for (let step = 0; step < 50; step++) {
    const middle = (low + high) / 2;
    if (damageOnGrid(total, 0, lnStep, middle) < damage) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
