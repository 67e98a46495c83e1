import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { DetailModel } from '../damage/detail-model.js';
import { spectrumOf } from '../rainflow/spectrum-of.js';
import { accountOf } from './account-of.js';
import type { LogOfAccount } from './log-of-account.js';

const SLOPE = 3;
const LOG10_A = 9;
const model: DetailModel = {
  factor: 1,
  stressConcentration: 1,
  sizeFactor: 1,
  lifeDivisor: 1,
  cutOff: 'as-curve',
  curve: { segments: [{ above: 0, m: SLOPE, log10a: LOG10_A }] },
  mean: { kind: 'none' },
  endBending: null,
};

function logsOf(histories: number[][], step = 1): LogOfAccount[] {
  return histories.map((loads, i) => ({
    loadLogId: `log-${i}`,
    fromMs: i * 1000,
    spectrum: spectrumOf(
      loads.map((load) => load * step),
      { step, day: i },
    ),
  }));
}

/**
 * Independent of the engine: the three-point procedure of ASTM E1049-85 section 5.4.4 on plain arrays, with damage
 * of each counted range taken straight from the power law.
 */
function threePointDamage(loads: number[]): number {
  const points: number[] = [];
  for (const load of loads) {
    if (points.length > 0 && points[points.length - 1] === load) continue;
    const n = points.length;
    if (n > 1 && Math.sign(points[n - 1] - points[n - 2]) === Math.sign(load - points[n - 1])) points.pop();
    points.push(load);
  }
  const damageOf = (range: number) => range ** SLOPE / 10 ** LOG10_A;
  let damage = 0;
  const stack: number[] = [];
  for (const point of points) {
    stack.push(point);
    while (stack.length >= 3) {
      const n = stack.length;
      const x = Math.abs(stack[n - 1] - stack[n - 2]);
      const y = Math.abs(stack[n - 2] - stack[n - 3]);
      if (x < y) break;
      if (n === 3) {
        damage += damageOf(y) / 2;
        stack.shift();
      } else {
        damage += damageOf(y);
        stack.splice(n - 3, 2);
      }
    }
  }
  for (let i = 1; i < stack.length; i++) damage += damageOf(Math.abs(stack[i] - stack[i - 1])) / 2;
  return damage;
}

const history = fc.array(fc.integer({ min: 0, max: 40 }), { minLength: 1, maxLength: 60 });
const histories = fc.array(history, { minLength: 1, maxLength: 5 });

describe('accountOf', () => {
  it('splits a small life by hand', () => {
    // Log 0: 5 9 3 7 2; log 1: 4 10 1. From the slack part on the life reads 0 5 9 3 7 2 4 10 1.
    // Turning points: 0 9 3 7 2 10 1. Within log 0 the range 3-7 (4) closes: recorded 4^3 = 64.
    // Log 1 (4 10 1) closes nothing. Between the logs 0 9 2 10 1: the range 9-2 (7) closes as one cycle: 343;
    // the open residue 0 10 1 leaves halves of 10 and 9: (1000 + 729) / 2 = 864.5.
    const account = accountOf(
      logsOf([
        [5, 9, 3, 7, 2],
        [4, 10, 1],
      ]),
      model,
    );
    expect(account.recorded.get('log-0')).toBeCloseTo(64e-9, 20);
    expect(account.recorded.get('log-1')).toBe(0);
    expect(account.betweenLogs).toBeCloseTo((343 + 864.5) * 1e-9, 18);
    expect(account.total).toBeCloseTo((64 + 343 + 864.5) * 1e-9, 18);
  });

  it('adds up to the one-pass count of the whole life, wherever the logs were cut', () => {
    fc.assert(
      fc.property(histories, (lives) => {
        const expected = threePointDamage([0, ...lives.flat()]);
        const total = accountOf(logsOf(lives), model).total;
        expect(Math.abs(total - expected)).toBeLessThanOrEqual(1e-12 * Math.max(expected, 1e-9));
      }),
      { seed: 41, numRuns: 400 },
    );
  });

  it('gives the same amounts to the last bit in whatever order logs come in', () => {
    const shuffled = histories.chain((lives) =>
      fc.tuple(
        fc.constant(lives),
        fc.shuffledSubarray(
          lives.map((_, i) => i),
          { minLength: lives.length },
        ),
      ),
    );
    fc.assert(
      fc.property(shuffled, ([lives, order]) => {
        const logs = logsOf(lives, 0.01);
        const inOrder = accountOf(logs, model);
        const asTheyCame = accountOf(
          order.map((i) => logs[i]),
          model,
        );
        expect(asTheyCame.betweenLogs).toBe(inOrder.betweenLogs);
        expect(asTheyCame.total).toBe(inOrder.total);
        for (const [id, amount] of inOrder.recorded) expect(asTheyCame.recorded.get(id)).toBe(amount);
      }),
      { seed: 42, numRuns: 300 },
    );
  });

  it('never lets a log change what another recorded', () => {
    fc.assert(
      fc.property(histories, history, (lives, later) => {
        const before = accountOf(logsOf(lives), model);
        const after = accountOf(logsOf([...lives, later]), model);
        for (const [id, amount] of before.recorded) expect(after.recorded.get(id)).toBe(amount);
        expect(after.total).toBeGreaterThanOrEqual(before.total * (1 - 1e-12));
      }),
      { seed: 43, numRuns: 200 },
    );
  });

  it('counts the first rise from the slack part', () => {
    // A constant load of 8 has no cycle of its own; from zero to 8 is one half cycle: 8^3 / 2 = 256.
    expect(accountOf(logsOf([[8, 8, 8]]), model).total).toBeCloseTo(256e-9, 20);
  });

  it('is empty without logs', () => {
    expect(accountOf([], model)).toEqual({ recorded: new Map(), betweenLogs: 0, total: 0 });
  });
});
