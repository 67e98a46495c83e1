import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Curve } from './curve.js';
import { cyclesToFailure } from './cycles-to-failure.js';
import { damagePerCycle } from './damage-per-cycle.js';

describe('damage per cycle', () => {
  it('is the inverse of the cycles to failure, for whole and broken slopes, at knees and below a cut-off', () => {
    const slope = fc.oneof(fc.constantFrom(3, 4, 5, 6, 9), fc.double({ min: 1, max: 14, noNaN: true }));
    fc.assert(
      fc.property(
        slope,
        slope,
        fc.double({ min: -2, max: 18, noNaN: true }),
        fc.double({ min: 1, max: 300, noNaN: true }),
        fc.constantFrom(0, 0.25),
        fc.double({ min: 0, max: 1000, noNaN: true }),
        (m1, m2, log10a, knee, cutOffShare, range) => {
          const curve: Curve = {
            segments: [
              { above: knee, m: m1, log10a },
              { above: knee * cutOffShare, m: m2, log10a: log10a + 1 },
            ],
          };
          const damageOf = damagePerCycle(curve);
          for (const at of [range, knee, knee * cutOffShare, knee * cutOffShare * 0.999]) {
            const expected = 1 / cyclesToFailure(curve, at);
            // Near the smallest doubles digits are lost; there both must be as good as nothing.
            if (expected < 1e-300) expect(damageOf(at)).toBeLessThan(1e-299);
            else expect(Math.abs(damageOf(at) / expected - 1)).toBeLessThan(1e-12);
          }
        },
      ),
    );
  });

  it('keeps its sense at the edges', () => {
    const damageOf = damagePerCycle({ segments: [{ above: 0, m: 3, log10a: 320 }] });
    // 1e10^3 / 1e320 = 1e-290, though 1e320 itself is beyond a double.
    expect(Math.abs(damageOf(1e10) / 1e-290 - 1)).toBeLessThan(1e-9);
    expect(damageOf(0)).toBe(0);
    expect(damageOf(Infinity)).toBe(Infinity);
    expect(() => damageOf(NaN)).toThrow(RangeError);
    expect(() => damageOf(-1)).toThrow(RangeError);
  });
});
