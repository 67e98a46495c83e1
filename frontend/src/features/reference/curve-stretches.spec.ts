import { describe, expect, it } from 'vitest';
import { curveStretches } from './curve-stretches';

const points = [400, 200, 100, 60, 30].map((range) => ({ range, cycles: 1e12 / range ** 3 }));
const ranges = (of: ReturnType<typeof curveStretches>) =>
  of.map(({ kind, points: own }) => [kind, ...own.map(({ range }) => range)]);

describe('curveStretches', () => {
  it('cuts the line at both bounds, which belong to both sides', () => {
    expect(ranges(curveStretches(points, { minRange: 60, maxRange: 200, note: '' }))).toEqual([
      ['beyond', 400, 200],
      ['supported', 200, 100, 60],
      ['beyond', 60, 30],
    ]);
  });

  it('leaves a line without bounds whole', () => {
    expect(ranges(curveStretches(points, { minRange: null, maxRange: null, note: '' }))).toEqual([
      ['supported', 400, 200, 100, 60, 30],
    ]);
  });
});
