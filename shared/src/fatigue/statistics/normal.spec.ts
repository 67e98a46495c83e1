import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { normalCdf, normalQuantile } from './normal.js';

describe('normal distribution', () => {
  // Independent reference: mpmath 1.3.0, ncdf at 40 digits. Phi(2) = 0.97725 is also the survival of a design curve.
  it.each([
    [-8, 6.2209605742717841e-16],
    [-3, 0.0013498980316300945],
    [-1, 0.15865525393145705],
    [-0.1, 0.46017216272297102],
    [0.5, 0.6914624612740131],
    [2, 0.97724986805182079],
    [6, 0.99999999901341235],
  ])('Phi(%s)', (x, expected) => {
    expect(Math.abs(normalCdf(x) / expected - 1)).toBeLessThan(5e-13);
  });

  // Independent reference: mpmath 1.3.0, sqrt(2) * erfinv(2p - 1) at 40 digits.
  it.each([
    [1e-12, -7.0344838253011319],
    [1e-4, -3.7190164854556806],
    [0.01, -2.3263478740408411],
    [0.3, -0.52440051270804078],
    [0.5, 0],
    [0.975, 1.9599639845400542],
  ])('quantile of %s', (p, expected) => {
    expect(normalQuantile(p)).toBeCloseTo(expected, 12);
  });

  it('goes there and back', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-300, max: 0.5, noNaN: true }), (p) => {
        expect(Math.abs(normalCdf(normalQuantile(p)) / p - 1)).toBeLessThan(1e-9);
      }),
    );
  });

  it('keeps its ends', () => {
    expect(normalQuantile(0)).toBe(-Infinity);
    expect(normalQuantile(1)).toBe(Infinity);
    expect(normalCdf(-Infinity)).toBe(0);
    expect(normalCdf(Infinity)).toBe(1);
    expect(normalCdf(NaN)).toBeNaN();
    expect(() => normalQuantile(1.1)).toThrow(RangeError);
    expect(() => normalQuantile(NaN)).toThrow(RangeError);
  });
});
