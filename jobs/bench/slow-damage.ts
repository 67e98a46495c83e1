import type { DetailModel } from '@stayledger/shared/fatigue/damage/detail-model';

/** The detail all rows evaluate: MPa per kN and a curve of two slopes. */
export const DETAIL = {
  factor: 9,
  curve: {
    segments: [
      { above: 60, m: 4, log10a: 14.2 },
      { above: 0, m: 6, log10a: 17.756 },
    ],
  },
};

/** The same as a model for the engine. */
export const MODEL: DetailModel = {
  ...DETAIL,
  stressConcentration: 1,
  sizeFactor: 1,
  lifeDivisor: 1,
  cutOff: 'as-curve',
  mean: { kind: 'none' },
  endBending: null,
};

/**
 * The slow path every fast one is compared with: the three-point algorithm of ASTM E1049-85 5.4.4 on plain arrays,
 * with a power for each cycle. Shares no code with the engine.
 *
 * @param loads kN
 * @param step grid in kN, 0 for none
 */
export function slowDamage(loads: ArrayLike<number>, step: number): number {
  let damage = 0;
  const add = (a: number, b: number, count: number) => {
    const stress = DETAIL.factor * Math.abs(a - b) * (step > 0 ? step : 1);
    const segment = DETAIL.curve.segments.find(({ above }) => stress >= above);
    if (segment !== undefined) damage += count / (10 ** segment.log10a * stress ** -segment.m);
  };
  const open: number[] = [];
  let ahead = NaN;
  const turn = (point: number) => {
    open.push(point);
    while (open.length >= 3) {
      const [p, q, r] = open.slice(-3);
      if (Math.abs(r - q) < Math.abs(q - p)) break;
      if (open.length === 3) {
        add(p, q, 0.5);
        open.shift();
      } else {
        add(p, q, 1);
        open.splice(-3, 2);
      }
    }
  };
  let before = NaN;
  for (let i = 0; i < loads.length; i++) {
    if (Number.isNaN(loads[i])) continue;
    const load = step > 0 ? Math.round(loads[i] / step) : loads[i];
    if (load === ahead) continue;
    const turns = Number.isNaN(before) || (ahead - before) * (load - ahead) < 0;
    if (!Number.isNaN(ahead) && turns) turn(ahead);
    before = ahead;
    ahead = load;
  }
  if (!Number.isNaN(ahead)) turn(ahead);
  for (let i = 1; i < open.length; i++) add(open[i - 1], open[i], 0.5);
  return damage;
}

/** Throws when a fast result is not the slow one, up to the rounding of long sums. */
export function expectSame(what: string, fast: number, slow: number): void {
  if (Math.abs(fast - slow) <= 1e-10 * Math.abs(slow)) return;
  throw new Error(`${what}: the fast path says ${fast}, the slow one ${slow}`);
}
