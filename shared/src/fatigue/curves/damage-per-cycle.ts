import type { Curve } from './curve.js';
import { cyclesToFailure } from './cycles-to-failure.js';

/**
 * Damage of one cycle as a function of its range, 1 / cyclesToFailure, with the constants of the curve worked out once:
 * a season holds some hundred thousand different cycles, and two powers each would be most of its time.
 *
 * @param curve any curve; later changes to it are not seen
 * @returns a function of the range, which throws RangeError for a negative range or NaN
 */
export function damagePerCycle(curve: Curve): (range: number) => number {
  const segments = curve.segments.map(({ above, m, log10a }) => ({ above, m, intercept: 10 ** log10a }));
  return (range) => {
    for (let i = 0; i < segments.length; i++) {
      const { above, m, intercept } = segments[i];
      if (above > range) continue;
      if (!(range >= above)) break;
      const damage = power(range, m) / intercept;
      // Beyond the reach of a double on the way there; the careful form knows what to do.
      return damage > 0 && damage < Infinity ? damage : 1 / cyclesToFailure(curve, range);
    }
    return 1 / cyclesToFailure(curve, range);
  };
}

/** The slopes of most curves are whole numbers, and multiplying is many times faster than a power. */
function power(range: number, m: number): number {
  const square = range * range;
  switch (m) {
    case 3:
      return square * range;
    case 4:
      return square * square;
    case 5:
      return square * square * range;
    case 6:
      return square * square * square;
    default:
      return range ** m;
  }
}
