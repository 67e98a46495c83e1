import { describe, expect, it } from 'vitest';
import type { DetailModel } from '../damage/detail-model.js';
import { samplingLoss } from '../damage/sampling-loss.js';
import { normalSource } from '../statistics/normal-source.js';
import { seededRandom } from '../statistics/seeded-random.js';
import { damageSlope } from './damage-slope.js';
import { decimated } from './decimated.js';
import { dominantFrequencyHz } from './dominant-frequency.js';
import { hampelOutliers } from './hampel-outliers.js';
import { samplingCorrection } from './sampling-correction.js';
import { summaryLogBounds } from './summary-log-bounds.js';
import { thinnedDamage } from './thinned-damage.js';

const detail = (m: number): DetailModel => ({
  factor: 1,
  stressConcentration: 1,
  sizeFactor: 1,
  lifeDivisor: 1,
  cutOff: 'as-curve',
  mean: { kind: 'none' },
  endBending: null,
  curve: { segments: [{ above: 0, m, log10a: 9 }] },
});

/** A sine with a slow gust under it and white noise on it. */
function load(seconds: number, rateHz: number, frequencyHz: number, noise = 0, seed = 1): Float64Array {
  const normal = normalSource(seededRandom(seed));
  return Float64Array.from({ length: seconds * rateHz }, (_, i) => {
    const t = i / rateHz;
    return 20 + 6 * Math.sin(t / 97) + 4 * Math.sin(2 * Math.PI * frequencyHz * t) + noise * normal();
  });
}

describe('dominant frequency', () => {
  it.each([0.1, 0.2, 0.31])('finds %s Hz under gusts of ten minutes', (frequencyHz) => {
    expect(dominantFrequencyHz(load(3600, 10, frequencyHz), 10)).toBeCloseTo(frequencyHz, 2);
  });

  it('is not taken in by noise when told its size', () => {
    const noisy = load(3600, 10, 0.2, 0.3);
    expect(dominantFrequencyHz(noisy, 10) ?? 0).toBeGreaterThan(0.22);
    expect(dominantFrequencyHz(noisy, 10, 1)).toBeCloseTo(0.2, 2);
  });

  it('leaves gaps out of the time', () => {
    const gappy = load(3600, 10, 0.2).map((value, i) => (i % 6000 < 3000 ? NaN : value));
    expect(dominantFrequencyHz(gappy, 10) ?? 0).toBeCloseTo(0.2, 1);
  });

  it('says nothing of less than a minute, and finds nothing in a constant', () => {
    expect(dominantFrequencyHz(load(59, 10, 0.2), 10)).toBeNull();
    expect(dominantFrequencyHz(new Float64Array(1000).fill(8), 10)).toBe(0);
    expect(() => dominantFrequencyHz([1, 2], 0)).toThrow(RangeError);
  });
});

describe('sampling correction', () => {
  it('divides by what the samples of a sine catch (LM-05: 0.823 at m = 3, 0.730 at m = 5, ratio 0.2)', () => {
    expect(samplingCorrection(0.2, 1, 3).factor).toBeCloseTo(1 / 0.823, 2);
    expect(samplingCorrection(0.2, 1, 5).factor).toBeCloseTo(1 / 0.73, 2);
    // Means over the interval lose (sin x / x)^m more: published table of the same section, 0.674 and 0.523.
    expect(samplingCorrection(0.2, 1, 3, true).damageRatio).toBeCloseTo(0.674, 2);
    expect(samplingCorrection(0.2, 1, 5, true).damageRatio).toBeCloseTo(0.523, 2);
  });

  it('is capped at two, and gives only a lower bound above 0.3', () => {
    expect(samplingCorrection(0.3, 1, 5)).toMatchObject({ capped: false, lowerBoundOnly: false });
    expect(samplingCorrection(0.3, 1, 5, true)).toMatchObject({ capped: true, factor: 2 });
    expect(samplingCorrection(0.31, 1, 5)).toMatchObject({ lowerBoundOnly: true });
    expect(samplingCorrection(0.9, 1, 5)).toMatchObject({ capped: true, factor: 2, lowerBoundOnly: true });
    expect(samplingCorrection(0, 1, 5)).toMatchObject({ factor: 1, lnSd: 0 });
    expect(() => samplingCorrection(-1, 1, 5)).toThrow(RangeError);
    expect(() => samplingCorrection(1, 0, 5)).toThrow(RangeError);
  });

  it('agrees with counting a swell of wandering phase at 20 Hz and at 1 Hz', () => {
    // Ratio 0.2; a random walk of the phase makes samples meet the crests at every angle.
    const normal = normalSource(seededRandom(3));
    let phase = 0;
    const fast = Float64Array.from({ length: 20 * 40_000 }, () => {
      phase += (2 * Math.PI * 0.2) / 20 + 0.01 * normal();
      return 10 + 5 * Math.sin(phase);
    });
    for (const m of [3, 5]) {
      const whole = thinnedDamage(fast, detail(m)).whole;
      const slow = thinnedDamage(decimated(fast, 20), detail(m)).whole;
      // 8,000 cycles: the ratio is steady to about one per cent; the closed mean leaves out jitter of the ranges.
      expect(Math.abs(slow / whole - samplingLoss(0.2, m).damageRatio)).toBeLessThan(0.02);
    }
  });

  it('counts at half and quarter rate, as the log itself would show', () => {
    const samples = Float64Array.from({ length: 8000 }, (_, i) => 20 + 4 * Math.sin(Math.PI * 0.1371 * i));
    const { whole, halfOverWhole, quarterOverWhole } = thinnedDamage(samples, detail(5));
    expect(whole).toBeGreaterThan(0);
    // Ratios 0.0686, 0.137 and 0.274 of frequency over rate; expected from the sampled sine.
    const caught = (ratio: number) => samplingLoss(ratio, 5).damageRatio;
    expect(Math.abs(halfOverWhole - caught(0.1371) / caught(0.0686))).toBeLessThan(0.03);
    expect(Math.abs(quarterOverWhole - caught(0.2742) / caught(0.0686))).toBeLessThan(0.05);
    expect(thinnedDamage([3, 3, 3], detail(5))).toEqual({ whole: 0, halfOverWhole: 1, quarterOverWhole: 1 });
    expect(Array.from(decimated([0, 1, 2, 3, 4], 2, 1))).toEqual([1, 3]);
    expect(() => decimated([1], 2, 2)).toThrow(RangeError);
  });

  it('takes the slope from the damage itself (hand: a power 4.5 at nine factors)', () => {
    const lnStep = 0.05;
    const total = Float64Array.from({ length: 9 }, (_, i) => 0.3 * Math.exp(4.5 * lnStep * (i - 4)));
    expect(damageSlope({ lnStep, total })).toBeCloseTo(4.5, 12);
    expect(damageSlope({ lnStep, total: new Float64Array(9) })).toBe(0);
  });
});

describe('samples that stand apart', () => {
  it('LM-06: 50 among 10.1, 10.2, 10.0, 10.1, 9.9, 10.0 (published example of the Hampel identifier)', () => {
    const [outlier, ...rest] = hampelOutliers([10.1, 10.2, 10.0, 50.0, 10.1, 9.9, 10.0]);
    expect(rest).toEqual([]);
    expect(outlier.index).toBe(3);
    expect(outlier.median).toBeCloseTo(10.1, 12);
    expect(outlier.deviation).toBeCloseTo(0.14826, 5);
  });

  it('leaves a load alone that stands still between steps of its resolution', () => {
    const steady = [5, 5, 5, 5.1, 5, 5, 5];
    expect(hampelOutliers(steady).map(({ index }) => index)).toEqual([3]);
    expect(hampelOutliers(steady, { floor: 0.2 })).toEqual([]);
    expect(hampelOutliers([])).toEqual([]);
    expect(() => hampelOutliers(steady, { halfWidth: 0 })).toThrow(RangeError);
  });
});

describe('logs of extremes', () => {
  it('are bounded by one cycle and by cycles at 0.25 Hz (hand: ranges 10 and 6, m = 3, ten minutes)', () => {
    const rows = [
      { minKn: 2, maxKn: 12 },
      { minKn: 4, maxKn: 10 },
      { minKn: 5, maxKn: 5 },
    ];
    const { lower, upper } = summaryLogBounds(rows, 600, detail(3));
    // (1000 + 216) / 1e9; 600 s hold 150 cycles.
    expect(lower).toBeCloseTo(1.216e-6, 15);
    expect(upper).toBeCloseTo(150 * 1.216e-6, 12);
    expect(summaryLogBounds(rows, 1, detail(3)).upper).toBe(lower);
    expect(() => summaryLogBounds([{ minKn: 2, maxKn: 1 }], 60, detail(3))).toThrow(RangeError);
    expect(() => summaryLogBounds(rows, 0, detail(3))).toThrow(RangeError);
  });
});
