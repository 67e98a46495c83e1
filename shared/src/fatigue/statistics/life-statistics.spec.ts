import { describe, expect, it } from 'vitest';
import { blockBootstrap, usualBlockLength } from './block-bootstrap.js';
import {
  conditionalFailureProbability,
  failureProbability,
  totalLnSd,
  yearsToProbability,
} from './failure-probability.js';
import { lnSdOfCov, lnSdOfLog10Sd, log10SdOfLnSd, lognormalMedian } from './lognormal.js';
import { normalCdf } from './normal.js';
import { seededRandom } from './seeded-random.js';
import { toleranceFactor } from './tolerance-factor.js';

function expectRelative(actual: number, expected: number, tolerance = 1e-6): void {
  expect(Math.abs(actual / expected - 1)).toBeLessThan(tolerance);
}

describe('scatter of lives', () => {
  it('ST-01: s 0.20 in ln, and mean over design life at two of them (derived: 0.2 ln 10, 10^0.4)', () => {
    expectRelative(lnSdOfLog10Sd(0.2), 0.460517);
    expectRelative(Math.exp(2 * lnSdOfLog10Sd(0.2)), 2.511886);
  });

  it('ST-02: cov 0.58 of the S-N constant (JCSS Probabilistic Model Code part 3, published)', () => {
    expectRelative(lnSdOfCov(0.58), 0.5384974);
    expectRelative(log10SdOfLnSd(lnSdOfCov(0.58)), 0.2338664);
  });

  it('ST-03: Miner sum of mean 1, cov 0.3 (JCSS Probabilistic Model Code part 3, published)', () => {
    expectRelative(lnSdOfCov(0.3), 0.2935604);
    expectRelative(lognormalMedian(1, 0.3), 0.9578263);
  });

  it('has no spread for a cov of zero and refuses a negative one', () => {
    expect(lnSdOfCov(0)).toBe(0);
    expect(() => lnSdOfCov(-0.1)).toThrow(RangeError);
  });
});

describe('probability of having failed', () => {
  // Median damage 0.02 a year, s 0.20, usage spread 0.25, Miner sum of mean 1 and cov 0.3 (section 5.4, derived).
  const spread = totalLnSd(lnSdOfLog10Sd(0.2), 0.25, lnSdOfCov(0.3));
  const model = {
    medianDamagePerYear: 0.02,
    medianMinerSum: lognormalMedian(1, 0.3),
    totalLnSd: spread,
  };

  it('ST-04: total spread and probabilities at 20 and 30 years (derived)', () => {
    // Hand: 0.460517^2 + 0.25^2 + 0.2935604^2 = 0.360754, its root 0.600628; ln(0.4 / 0.957826) / 0.600628 = -1.45378.
    expectRelative(spread, 0.6006277);
    expectRelative(failureProbability(model, 20), 0.07299872);
    expectRelative(failureProbability(model, 30), 0.2180645);
  });

  it('ST-05: years to 5 % and 1 % (derived)', () => {
    expectRelative(yearsToProbability(model, 0.05), 17.83191);
    expectRelative(yearsToProbability(model, 0.01), 11.84215);
  });

  it('ST-06: chance of failing in the 21st year when sound at 20 (derived)', () => {
    expectRelative(conditionalFailureProbability(model, 20, 21), 0.01288261);
  });

  it('has even odds when the median damage reaches the median Miner sum', () => {
    // t = 0.9578263 / 0.02 = 47.8913 years, whatever the spread.
    expectRelative(yearsToProbability(model, 0.5), 47.891315);
    expect(failureProbability(model, 0)).toBe(0);
  });

  it('agrees with drawing 200,000 lives (seeded)', () => {
    const random = seededRandom(7);
    const draws = 200_000;
    let failed = 0;
    for (let i = 0; i < draws; i++) {
      // A normal draw made of twelve uniform ones, independent of the quantile under test elsewhere.
      let normal = -6;
      for (let j = 0; j < 12; j++) normal += random();
      if (20 * 0.02 * Math.exp(normal * spread) > lognormalMedian(1, 0.3)) failed++;
    }
    // Standard error 0.0006; a sum of twelve is slightly short in its tails, hence 0.003.
    expect(Math.abs(failed / draws - 0.07299872)).toBeLessThan(0.003);
  });
});

describe('block bootstrap', () => {
  const days = [1, 2, 3, 4, 5, 6];

  it('ST-07: variance of the mean for days 1..6, blocks of 2 (hand: 2.666667 / 3 = 0.888889)', () => {
    // All 27 ways to draw three of three blocks, each once: the exact distribution, no sampling error.
    const wanted: number[] = [];
    for (let i = 0; i < 27; i++)
      for (const digit of [i % 3, Math.floor(i / 3) % 3, Math.floor(i / 9)]) wanted.push(digit);
    let call = 0;
    const sums = blockBootstrap({
      dailyDamage: days,
      blockLengthDays: 2,
      forecastDays: 6,
      replicates: 27,
      blocks: 'non-overlapping',
      random: () => (wanted[call++] + 0.5) / 3,
    });
    const means = Array.from(sums, (sum) => sum / 6);
    const mean = means.reduce((a, b) => a + b) / 27;
    const variance = means.reduce((a, b) => a + (b - mean) ** 2, 0) / 27;
    expect(mean).toBeCloseTo(3.5, 12);
    expect(variance).toBeCloseTo(0.8888889, 7);
  });

  it('converges to the same variance by drawing', () => {
    const replicates = 20_000;
    const sums = blockBootstrap({
      dailyDamage: days,
      blockLengthDays: 2,
      forecastDays: 6,
      replicates,
      blocks: 'non-overlapping',
      random: seededRandom(1),
    });
    const mean = sums.reduce((a, b) => a + b) / replicates;
    const variance = sums.reduce((a, b) => a + (b - mean) ** 2, 0) / replicates / 36;
    // Standard error of a variance of about 2 / sqrt(20000) of itself; four of them.
    expect(Math.abs(variance - 0.8888889)).toBeLessThan(0.036);
  });

  it('moves its blocks day by day and cuts the last one', () => {
    const starts = [0, 4, 2];
    let call = 0;
    const [sum] = blockBootstrap({
      dailyDamage: days,
      blockLengthDays: 2,
      forecastDays: 5,
      replicates: 1,
      blocks: 'moving',
      random: () => (starts[call++] + 0.5) / 5,
    });
    // (1 + 2) + (5 + 6) + 3
    expect(sum).toBe(17);
  });

  it('refuses blocks that do not fit', () => {
    const base = { forecastDays: 5, replicates: 1, blocks: 'moving' as const, random: () => 0 };
    expect(() => blockBootstrap({ ...base, dailyDamage: [], blockLengthDays: 1 })).toThrow(RangeError);
    expect(() => blockBootstrap({ ...base, dailyDamage: days, blockLengthDays: 7 })).toThrow(RangeError);
    expect(() => blockBootstrap({ ...base, dailyDamage: days, blockLengthDays: 1.5 })).toThrow(RangeError);
    expect(usualBlockLength(120)).toBe(5);
    expect(usualBlockLength(1)).toBe(1);
  });
});

describe('tolerance factor', () => {
  // ST-08 and its neighbours: non-central t quantiles; recomputed with scipy 1.17.1 (nct.ppf), another program.
  it.each([
    { tests: 5, confidence: 0.75, expected: 2.463383 },
    { tests: 10, confidence: 0.75, expected: 2.103668 },
    { tests: 15, confidence: 0.75, expected: 1.990803 },
    { tests: 30, confidence: 0.75, expected: 1.868608 },
    { tests: 5, confidence: 0.95, expected: 4.202681 },
    { tests: 10, confidence: 0.95, expected: 2.910963 },
    { tests: 30, confidence: 0.95, expected: 2.219838 },
  ])('ST-08: 95 % survival, $tests tests, confidence $confidence', ({ tests, confidence, expected }) => {
    expect(Math.abs(toleranceFactor(tests, 0.95, confidence) - expected)).toBeLessThan(2e-5);
  });

  it('tends to the normal quantile for very many tests', () => {
    expect(normalCdf(toleranceFactor(100_000, 0.95, 0.5))).toBeCloseTo(0.95, 4);
  });

  it('refuses fewer than two tests', () => {
    expect(() => toleranceFactor(1, 0.95, 0.75)).toThrow(RangeError);
    expect(() => toleranceFactor(10, 0.4, 0.75)).toThrow(RangeError);
    expect(() => toleranceFactor(10, 0.95, 1)).toThrow(RangeError);
  });
});

describe('seeded random numbers', () => {
  it('repeat for a seed and differ between seeds', () => {
    const draw = (seed: number): number[] => {
      const random = seededRandom(seed);
      return Array.from({ length: 5 }, () => random());
    };
    expect(draw(42)).toEqual(draw(42));
    expect(draw(42)).not.toEqual(draw(43));
  });

  it('are even over the unit interval and not correlated with their neighbours', () => {
    const random = seededRandom(2026);
    const draws = 100_000;
    const bins = new Array<number>(20).fill(0);
    let previous = random();
    let products = 0;
    let outside = 0;
    for (let i = 0; i < draws; i++) {
      const value = random();
      if (!(value >= 0 && value < 1)) outside++;
      bins[Math.floor(value * 20)]++;
      products += (value - 0.5) * (previous - 0.5);
      previous = value;
    }
    expect(outside).toBe(0);
    // Chi-square of 19 degrees of freedom: 43.8 is exceeded once in a thousand.
    const expected = draws / 20;
    const chiSquare = bins.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
    expect(chiSquare).toBeLessThan(43.8);
    // Variance 1/12: the correlation has a standard error of 1 / sqrt(100000).
    expect(Math.abs((products / draws) * 12)).toBeLessThan(4 / Math.sqrt(draws));
  });
});
