import type { Curve } from './curve.js';

/** The families of curves that EN 1993 draws through a detail category. */
export type CategoryFamily = 'normal-stress' | 'shear-stress' | 'tension-component';

/** Cycles at which EN 1993 states a detail category. */
const CATEGORY_CYCLES = 2e6;

/**
 * The curve of a detail category of EN 1993: the category is the range at 2 million cycles.
 * - normal stress: slope 3 to 5 million cycles, 5 to 100 million, nothing below;
 * - shear stress: slope 5 to 100 million cycles, nothing below;
 * - tension component: slope 4 above the category, 6 below it, no cut-off.
 *
 * @param categoryMpa range at 2 million cycles, MPa
 * @throws RangeError for a category that is not above zero
 * Source: EN 1993-1-9 clause 7.1 (from memory); EN 1993-1-11:2006 Figure 9.1 (secondary).
 */
export function categoryCurve(family: CategoryFamily, categoryMpa: number): Curve {
  if (!(categoryMpa > 0)) throw new RangeError(`A detail category must be above zero, not ${categoryMpa}.`);
  const through = (range: number, cycles: number, m: number): number =>
    Math.log10(cycles) + m * Math.log10(range);
  switch (family) {
    case 'normal-stress': {
      const knee = categoryMpa * (CATEGORY_CYCLES / 5e6) ** (1 / 3);
      const cutOff = knee * (5e6 / 1e8) ** (1 / 5);
      return {
        segments: [
          { above: knee, m: 3, log10a: through(categoryMpa, CATEGORY_CYCLES, 3) },
          { above: cutOff, m: 5, log10a: through(knee, 5e6, 5) },
        ],
      };
    }
    case 'shear-stress': {
      const cutOff = categoryMpa * (CATEGORY_CYCLES / 1e8) ** (1 / 5);
      return { segments: [{ above: cutOff, m: 5, log10a: through(categoryMpa, CATEGORY_CYCLES, 5) }] };
    }
    case 'tension-component':
      return {
        segments: [
          { above: categoryMpa, m: 4, log10a: through(categoryMpa, CATEGORY_CYCLES, 4) },
          { above: 0, m: 6, log10a: through(categoryMpa, CATEGORY_CYCLES, 6) },
        ],
      };
  }
}
