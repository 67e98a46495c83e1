import { describe, expect, it } from 'vitest';
import { samplingLoss } from './sampling-loss.js';

describe('what sampling sees of a sine', () => {
  it('LM-05: frequency over rate 0.2 (derived; damage ratios to 0.001)', () => {
    const loss = samplingLoss(0.2, 3);
    expect(loss.meanPeak).toBeCloseTo(0.93549, 5);
    expect(loss.worstPeak).toBeCloseTo(0.80902, 5);
    expect(Math.abs(loss.damageRatio - 0.823)).toBeLessThan(0.001);
    expect(Math.abs(samplingLoss(0.2, 5).damageRatio - 0.73)).toBeLessThan(0.001);
  });

  it('is exact for slope 1: the mean peak itself, sin(x) / x', () => {
    for (const ratio of [0.05, 0.1, 0.3, 0.5]) {
      expect(samplingLoss(ratio, 1).damageRatio).toBeCloseTo(
        Math.sin(Math.PI * ratio) / (Math.PI * ratio),
        8,
      );
    }
  });

  it('is exact for slope 2: (mean of cos squared + mean peak squared) / 2 (hand)', () => {
    // ((c1 + c2) / 2)^2 = (c1^2 + c2^2 + 2 c1 c2) / 4; mean of cos^2 over the phase x is 1/2 + sin(2x) / (4x).
    const x = 0.3 * Math.PI;
    const expected = (0.5 + Math.sin(2 * x) / (4 * x)) / 2 + (Math.sin(x) / x) ** 2 / 2;
    expect(samplingLoss(0.3, 2).damageRatio).toBeCloseTo(expected, 8);
  });

  it('loses nothing at rest, more with steeper curves and slower rates', () => {
    expect(samplingLoss(0, 5)).toEqual({ meanPeak: 1, worstPeak: 1, damageRatio: 1 });
    expect(samplingLoss(0.2, 5).damageRatio).toBeLessThan(samplingLoss(0.2, 3).damageRatio);
    expect(samplingLoss(0.3, 3).damageRatio).toBeLessThan(samplingLoss(0.2, 3).damageRatio);
    expect(() => samplingLoss(0.6, 3)).toThrow(RangeError);
    expect(() => samplingLoss(-0.1, 3)).toThrow(RangeError);
  });
});
