import { describe, expect, it } from 'vitest';
import { curvePoints } from './curve-points';

describe('curvePoints', () => {
  // Two slopes that meet at S = 100, N = 2e6: log10 a = 6.30103 + m * 2.
  const knee = Math.log10(2e6);
  const curve = {
    segments: [
      { above: 100, m: 3, log10a: knee + 6 },
      { above: 0, m: 5, log10a: knee + 10 },
    ],
  };

  it('runs from ten thousand to a thousand million cycles', () => {
    const points = curvePoints(curve);
    // By hand: S = 100 * (2e6 / 1e4)^(1/3) = 584.80 and S = 100 * (2e6 / 1e9)^(1/5) = 28.854.
    expect(points[0].range).toBeCloseTo(584.8, 1);
    expect(points[0].cycles / 1e4).toBeCloseTo(1, 9);
    expect(points.at(-1)?.range).toBeCloseTo(28.854, 3);
    expect((points.at(-1)?.cycles ?? 0) / 1e9).toBeCloseTo(1, 9);
  });

  it('holds the knee and falls from point to point', () => {
    const points = curvePoints(curve);
    expect(points.some(({ range, cycles }) => range === 100 && Math.abs(cycles / 2e6 - 1) < 1e-9)).toBe(true);
    for (let index = 1; index < points.length; index += 1) {
      expect(points[index].range).toBeLessThan(points[index - 1].range);
      expect(points[index].cycles).toBeGreaterThan(points[index - 1].cycles);
    }
  });

  it('stops at a cut-off: below it there is no life to draw', () => {
    const points = curvePoints({ segments: [{ above: 50, m: 3, log10a: knee + 6 }] });
    expect(points.at(-1)?.range).toBeCloseTo(50, 9);
  });
});
