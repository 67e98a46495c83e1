import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { categoryCurve } from './category-curve.js';
import type { Curve, ReferenceCurve } from './curve.js';
import { curveProblems } from './curve-problems.js';
import { cyclesToFailure } from './cycles-to-failure.js';
import { cyclesToFailureAtMean } from './cycles-to-failure-at-mean.js';
import { divideLife } from './divide-life.js';
import { elementary } from './elementary.js';
import { haibach } from './haibach.js';
import { kneeRange } from './knee-range.js';
import { knees } from './knees.js';
import { rangeForCycles } from './range-for-cycles.js';
import { scaleStrength } from './scale-strength.js';
import { shiftToMean } from './shift-to-mean.js';
import { thicknessFactor } from './thickness-factor.js';
import { threadSizeFactor } from './thread-size-factor.js';
import { withoutCutOff } from './without-cut-off.js';

function expectRelative(actual: number, expected: number, tolerance = 1e-6): void {
  expect(Math.abs(actual / expected - 1)).toBeLessThan(tolerance);
}

/** Continuous curves of one to four segments, from a starting point downwards. */
const continuousCurves: fc.Arbitrary<Curve> = fc
  .record({
    m: fc.double({ min: 2, max: 9, noNaN: true }),
    log10a: fc.double({ min: 8, max: 18, noNaN: true }),
    knees: fc.uniqueArray(fc.integer({ min: 1, max: 400 }), { maxLength: 3 }),
    steeper: fc.array(fc.double({ min: 0.5, max: 4, noNaN: true }), { minLength: 3, maxLength: 3 }),
  })
  .map(({ m, log10a, knees: bounds, steeper }) => {
    const sorted = [...bounds].sort((a, b) => b - a);
    const segments = [{ above: sorted[0] ?? 0, m, log10a }];
    sorted.forEach((bound, i) => {
      const last = segments[segments.length - 1];
      const slope = last.m + steeper[i];
      segments.push({
        above: sorted[i + 1] ?? 0,
        m: slope,
        log10a: last.log10a + (slope - last.m) * Math.log10(bound),
      });
    });
    return { segments };
  });

describe('EN 1993-1-9 categories', () => {
  it('SN-01: knee and cut-off as shares of the category (clause 7.1, from memory; derived)', () => {
    const { segments } = categoryCurve('normal-stress', 1);
    expect(segments[0].above).toBeCloseTo(0.736806, 6);
    expect(segments[1].above / segments[0].above).toBeCloseTo(0.54928, 6);
    expect(segments[1].above).toBeCloseTo(0.404713, 6);
  });

  it('SN-02: constant of category 160 (public test of an open program, secondary)', () => {
    expectRelative(10 ** categoryCurve('normal-stress', 160).segments[0].log10a, 8.192e12);
  });

  it('SN-03: category 71 (hand: 2e6 * (71 / S)^3; 5e6 * (52.3132 / 40)^5; below 28.73 nothing)', () => {
    const curve = categoryCurve('normal-stress', 71);
    expectRelative(cyclesToFailure(curve, 100), 715_822);
    expectRelative(cyclesToFailure(curve, 40), 1.913059e7);
    expect(cyclesToFailure(curve, 28)).toBe(Infinity);
  });

  it('SN-04: category 50 for threads (hand as SN-03)', () => {
    const curve = categoryCurve('normal-stress', 50);
    expectRelative(cyclesToFailure(curve, 60), 1_157_407.4);
    expectRelative(cyclesToFailure(curve, 30), 1.3963054e7);
  });

  it('SN-05: size factor of a 36 mm thread (EN 1993-1-9 detail 14, secondary)', () => {
    const rule = { exponent: 0.25, referenceMm: 30 };
    expectRelative(1 / threadSizeFactor(36, rule), 0.955443);
    expect(threadSizeFactor(30, rule)).toBe(1);
    expect(threadSizeFactor(12, rule)).toBe(1);
  });

  it('shear: slope 5 to 1e8 cycles, cut-off at 0.4573 of the category (clause 7.1, from memory)', () => {
    const curve = categoryCurve('shear-stress', 100);
    expect(curve.segments[0].above).toBeCloseTo(45.73, 2);
    expectRelative(cyclesToFailure(curve, 100), 2e6);
    expectRelative(cyclesToFailure(curve, 50), 6.4e7);
    expect(cyclesToFailure(curve, 45)).toBe(Infinity);
  });

  it('refuses a category of zero', () => {
    expect(() => categoryCurve('normal-stress', 0)).toThrow(RangeError);
  });
});

describe('EN 1993-1-11 tension components', () => {
  it('SN-06: category 150 (Table 9.1 and Figure 9.1, secondary)', () => {
    const curve = categoryCurve('tension-component', 150);
    expectRelative(cyclesToFailure(curve, 200), 632_812.5);
    expectRelative(cyclesToFailure(curve, 150), 2e6);
    expectRelative(cyclesToFailure(curve, 100), 2.278125e7);
    expectRelative(cyclesToFailure(curve, 75), 1.28e8);
  });
});

describe('cycles to failure', () => {
  const twoSlopes: Curve = {
    segments: [
      { above: 100, m: 3, log10a: 12 },
      { above: 0, m: 5, log10a: 16 },
    ],
  };

  it('takes the upper segment exactly on a knee', () => {
    // The lower segment would give 1e16 / 1e10 = 1e6 as well; with a jump the difference shows.
    const jump: Curve = { segments: [twoSlopes.segments[0], { above: 0, m: 5, log10a: 17 }] };
    expectRelative(cyclesToFailure(jump, 100), 1e6, 1e-12);
    expectRelative(cyclesToFailure(jump, 99.999999), 1e7, 1e-6);
  });

  it('never fails at a range of zero and at once at an infinite one', () => {
    expect(cyclesToFailure(twoSlopes, 0)).toBe(Infinity);
    expect(cyclesToFailure(twoSlopes, Infinity)).toBe(0);
  });

  it('keeps its sense at the edges of a double', () => {
    const steep: Curve = { segments: [{ above: 0, m: 13.46, log10a: -0.6 }] };
    // 1e-300^-13.46 overflows: no damage, not NaN. 1e300^13.46 underflows: no life.
    expect(cyclesToFailure(steep, 1e-300)).toBe(Infinity);
    expect(cyclesToFailure(steep, 1e300)).toBe(0);
    // 10^320 alone is beyond a double, 10^320 * 10^-30 is not.
    const huge: Curve = { segments: [{ above: 0, m: 3, log10a: 320 }] };
    expectRelative(cyclesToFailure(huge, 1e10), 1e290, 1e-9);
  });

  it('refuses negative ranges and NaN', () => {
    expect(() => cyclesToFailure(twoSlopes, -1)).toThrow(RangeError);
    expect(() => cyclesToFailure(twoSlopes, NaN)).toThrow(RangeError);
  });

  it('does not grow with the range', () => {
    fc.assert(
      fc.property(
        continuousCurves,
        fc.double({ min: 0.1, max: 1000, noNaN: true }),
        fc.double({ min: 1, max: 3, noNaN: true }),
        (curve, range, factor) => {
          expect(cyclesToFailure(curve, range * factor)).toBeLessThanOrEqual(
            cyclesToFailure(curve, range) * (1 + 1e-9),
          );
        },
      ),
    );
  });
});

describe('range for cycles', () => {
  it('goes there and back on any continuous curve', () => {
    fc.assert(
      fc.property(continuousCurves, fc.double({ min: 0.5, max: 800, noNaN: true }), (curve, range) => {
        expectRelative(rangeForCycles(curve, cyclesToFailure(curve, range)), range, 1e-9);
      }),
    );
  });

  it('SN-07: stress of the E301 spiral rope at 2e6 cycles (DNV-OS-E301 2018, secondary)', () => {
    const spiral: Curve = { segments: [{ above: 0, m: 4.8, log10a: Math.log10(1.7e17) }] };
    expectRelative(rangeForCycles(spiral, 2e6), 189.2179);
  });

  it('stays at the cut-off past its life', () => {
    const curve = categoryCurve('normal-stress', 71);
    expect(rangeForCycles(curve, 1e12)).toBe(curve.segments[1].above);
    expectRelative(rangeForCycles(curve, 1e8), curve.segments[1].above, 1e-9);
  });

  it('answers a jump with the range of the jump', () => {
    const jump: Curve = {
      segments: [
        { above: 100, m: 3, log10a: 12 },
        { above: 0, m: 5, log10a: 17 },
      ],
    };
    expect(rangeForCycles(jump, 5e6)).toBe(100);
  });

  it('refuses no cycles', () => {
    expect(() => rangeForCycles(categoryCurve('normal-stress', 71), 0)).toThrow(RangeError);
  });
});

describe('knees and variants', () => {
  it('names the knees and the cut-off of category 71', () => {
    const [knee, cutOff] = knees(categoryCurve('normal-stress', 71));
    expectRelative(knee.range, 52.31, 1e-4);
    expectRelative(knee.cyclesAbove, 5e6, 1e-9);
    expectRelative(knee.cyclesBelow, 5e6, 1e-9);
    expectRelative(cutOff.range, 28.73, 2e-4);
    expectRelative(cutOff.cyclesAbove, 1e8, 1e-9);
    expect(cutOff.cyclesBelow).toBe(Infinity);
  });

  it('finds the knee from the constants (class D: 52.60, DNV-RP-C203 2016, secondary)', () => {
    expect(kneeRange({ m: 3, log10a: 12.164 }, { m: 5, log10a: 15.606 })).toBeCloseTo(52.6, 2);
    expect(() => kneeRange({ m: 3, log10a: 12 }, { m: 3, log10a: 13 })).toThrow(RangeError);
  });

  it('draws Haibach below the knee with 2m - 1, continuous (Haibach 1970, from memory)', () => {
    for (const [m, expected] of [
      [3, 5],
      [4, 7],
      [5, 9],
    ]) {
      const curve = haibach(m, 12, 60);
      expect(curve.segments[1].m).toBe(expected);
      const [knee] = knees(curve);
      expectRelative(knee.cyclesBelow, knee.cyclesAbove, 1e-9);
    }
    expect(() => haibach(1, 12, 60)).toThrow(RangeError);
    expect(() => haibach(3, 12, 0)).toThrow(RangeError);
  });

  it('never lives longer on the elementary curve, then Haibach, then with a cut-off', () => {
    const cutOff: Curve = { segments: [{ above: 60, m: 3, log10a: 12 }] };
    const branch = haibach(3, 12, 60);
    fc.assert(
      fc.property(fc.double({ min: 1, max: 200, noNaN: true }), (range) => {
        const lives = [elementary(branch), branch, cutOff].map((curve) => cyclesToFailure(curve, range));
        expect(lives[0]).toBeLessThanOrEqual(lives[1] * (1 + 1e-9));
        expect(lives[1]).toBeLessThanOrEqual(lives[2] * (1 + 1e-9));
      }),
    );
    expect(() => elementary({ segments: [] })).toThrow(RangeError);
  });

  it('loses its cut-off and nothing else', () => {
    const curve = categoryCurve('normal-stress', 71);
    const open = { segments: withoutCutOff(curve) };
    expect(cyclesToFailure(open, 60)).toBe(cyclesToFailure(curve, 60));
    expect(cyclesToFailure(open, 30)).toBe(cyclesToFailure(curve, 30));
    // Hand: 1e8 * (28.7346 / 20)^5 = 6.1219e8.
    expectRelative(cyclesToFailure(open, 20), 1e8 * (28.7346 / 20) ** 5, 1e-4);
    expect(curve.segments[1].above).toBeGreaterThan(28);
  });

  it('divides lives, and only divides', () => {
    const curve = categoryCurve('tension-component', 150);
    const harsh = { segments: divideLife(curve, 3) };
    fc.assert(
      fc.property(fc.double({ min: 1, max: 500, noNaN: true }), (range) => {
        expectRelative(cyclesToFailure(curve, range) / cyclesToFailure(harsh, range), 3, 1e-9);
      }),
    );
    expect(() => divideLife(curve, 0.5)).toThrow(RangeError);
  });

  it('draws the shape of category 150 through 112: the same curve as category 112', () => {
    const scaled = { segments: scaleStrength(categoryCurve('tension-component', 150), 112 / 150) };
    const direct = categoryCurve('tension-component', 112);
    for (const range of [30, 111, 112, 113, 300]) {
      expectRelative(cyclesToFailure(scaled, range), cyclesToFailure(direct, range), 1e-9);
    }
    expect(() => scaleStrength(direct, 0)).toThrow(RangeError);
  });

  it('SN-16: factor of a 50 mm plate, class D (DNV-RP-C203 2016, secondary)', () => {
    const rule = { exponent: 0.2, referenceMm: 25 };
    expectRelative(thicknessFactor(50, rule), 1.148698);
    expect(thicknessFactor(25, rule)).toBe(1);
    expect(thicknessFactor(6, rule)).toBe(1);
  });
});

describe('shift to the mean', () => {
  const design: Pick<ReferenceCurve, 'segments' | 'level' | 'k' | 'sdLog10N'> = {
    segments: [{ above: 0, m: 3, log10a: 12.6007 - 2 * 0.2095 }],
    level: 'mean-minus-k-sd',
    k: 2,
    sdLog10N: 0.2095,
  };

  it('SN-17: class D mean and design at 100 MPa (class-society rules, secondary)', () => {
    expectRelative(cyclesToFailure({ segments: shiftToMean(design) }, 100), 3.987494e6);
    expectRelative(cyclesToFailure(design, 100), 1.519498e6);
  });

  it('moves EN curves by 1.645 times 0.25, as no scatter is published (hand: 0.41125)', () => {
    const curve = { ...design, level: 'fractile-95-75' as const, k: 1.645, sdLog10N: null };
    expect(shiftToMean(curve)[0].log10a - curve.segments[0].log10a).toBeCloseTo(0.41125, 12);
  });

  it('leaves curves of unknown level and mean curves where they are', () => {
    expect(shiftToMean({ ...design, level: 'unknown' })).toEqual(design.segments);
    expect(shiftToMean({ ...design, level: 'mean' })).toEqual(design.segments);
  });
});

describe('mean-load term', () => {
  const spiral: Pick<ReferenceCurve, 'segments' | 'meanLoad'> = {
    segments: [{ above: 0, m: 5.05, log10a: 3.25 }],
    meanLoad: {
      kind: 'load-ratio-exponent',
      perMeanRatio: 3.43,
      minRatio: 0,
      maxRatio: 0.6,
      reason: 'own term',
    },
  };
  const stranded: Pick<ReferenceCurve, 'segments' | 'meanLoad'> = {
    segments: [{ above: 0, m: 4.09, log10a: 3.2 }],
    meanLoad: {
      kind: 'load-ratio-exponent',
      perMeanRatio: 2.79,
      minRatio: 0,
      maxRatio: 0.6,
      reason: 'own term',
    },
  };

  it('SN-09, SN-10: API RP 2SK 3rd edition (2005), secondary', () => {
    expectRelative(cyclesToFailureAtMean(spiral, 0.2, 0.3), 5.633762e5);
    expectRelative(cyclesToFailureAtMean(spiral, 0.15, 0.3), 2.408458e6);
    expectRelative(cyclesToFailureAtMean(stranded, 0.2, 0.2), 3.168016e5);
  });

  it('SN-11: a tenth more mean divides life by 2.203 and 1.901 (derived: 10^0.343, 10^0.279)', () => {
    expectRelative(
      cyclesToFailureAtMean(spiral, 0.2, 0.2) / cyclesToFailureAtMean(spiral, 0.2, 0.3),
      2.202926,
    );
    expectRelative(
      cyclesToFailureAtMean(stranded, 0.2, 0.2) / cyclesToFailureAtMean(stranded, 0.2, 0.3),
      1.901078,
    );
  });

  it('clips the mean to 0 and 0.6', () => {
    expect(cyclesToFailureAtMean(spiral, 0.2, -0.1)).toBe(cyclesToFailureAtMean(spiral, 0.2, 0));
    expect(cyclesToFailureAtMean(spiral, 0.2, 0.9)).toBe(cyclesToFailureAtMean(spiral, 0.2, 0.6));
  });

  it('is left alone on curves without one', () => {
    const plain = { segments: spiral.segments, meanLoad: { kind: 'none' as const, reason: 'in the tests' } };
    expect(cyclesToFailureAtMean(plain, 0.2, 0.5)).toBe(cyclesToFailure(plain, 0.2));
  });
});

describe('curves from outside', () => {
  it('names what is wrong, and where', () => {
    expect(curveProblems({ segments: [] })).toEqual(['A curve needs at least one segment.']);
    expect(
      curveProblems({
        segments: [
          { above: 0, m: 3, log10a: 12 },
          { above: 100, m: 0, log10a: NaN },
        ],
      }),
    ).toEqual([
      'Segment 2: the slope m must be above zero, not 0.',
      'Segment 2: log10a must be a number, not NaN.',
      'Segment 2: segments must run from high to low ranges.',
    ]);
    expect(curveProblems({ segments: [{ above: -1, m: 3, log10a: 12 }] })).toEqual([
      'Segment 1: "above" must be zero or more, not -1.',
    ]);
  });

  it('finds nothing wrong with continuous curves', () => {
    fc.assert(fc.property(continuousCurves, (curve) => void expect(curveProblems(curve)).toEqual([])));
  });
});
