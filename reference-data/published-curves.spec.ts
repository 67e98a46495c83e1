import type { ReferenceCurve } from '@stayledger/shared/fatigue/curves/curve';
import { categoryCurve } from '@stayledger/shared/fatigue/curves/category-curve';
import { cyclesToFailure } from '@stayledger/shared/fatigue/curves/cycles-to-failure';
import { cyclesToFailureAtMean } from '@stayledger/shared/fatigue/curves/cycles-to-failure-at-mean';
import { rangeForCycles } from '@stayledger/shared/fatigue/curves/range-for-cycles';
import { shiftToMean } from '@stayledger/shared/fatigue/curves/shift-to-mean';
import { thicknessFactor } from '@stayledger/shared/fatigue/curves/thickness-factor';
import { threadSizeFactor } from '@stayledger/shared/fatigue/curves/thread-size-factor';
import { damageOfCounts } from '@stayledger/shared/fatigue/damage/damage-of-counts';
import { describe, expect, it } from 'vitest';
import { curvesFileSchema } from '@stayledger/shared/contracts/curves';
import curvesFile from './curves.json' with { type: 'json' };

const CURVES: ReferenceCurve[] = curvesFileSchema.parse(curvesFile).curves;

function curve(id: string): ReferenceCurve {
  const found = CURVES.find((candidate) => candidate.id === id);
  if (found === undefined) throw new Error(`There is no curve ${id}.`);
  return found;
}

function expectRelative(actual: number, expected: number, tolerance = 1e-6): void {
  expect(Math.abs(actual / expected - 1)).toBeLessThan(tolerance);
}

describe('check values of the curves as shipped', () => {
  // id, curve, range in its measure, cycles, source of the check.
  it.each([
    ['SN-02', 'en-1993-1-9-160', 200, 8.192e12 / 8e6, 'public test of an open program, secondary'],
    ['SN-03', 'en-1993-1-9-71', 100, 715_822, 'EN 1993-1-9 clause 7.1, derived'],
    ['SN-03', 'en-1993-1-9-71', 40, 1.913059e7, 'EN 1993-1-9 clause 7.1, derived'],
    ['SN-04', 'en-1993-1-9-50', 60, 1_157_407.4, 'EN 1993-1-9 clause 7.1, derived'],
    ['SN-04', 'en-1993-1-9-50', 30, 1.3963054e7, 'EN 1993-1-9 clause 7.1, derived'],
    ['SN-06', 'en-1993-1-11-150', 200, 632_812.5, 'EN 1993-1-11:2006 Table 9.1, secondary'],
    ['SN-06', 'en-1993-1-11-150', 100, 2.278125e7, 'EN 1993-1-11:2006 Table 9.1, secondary'],
    ['SN-06', 'en-1993-1-11-150', 75, 1.28e8, 'EN 1993-1-11:2006 Table 9.1, secondary'],
    ['2.2', 'en-1993-1-11-105', 80, 1.022412e7, 'EN 1993-1-11:2006 Table 9.1, secondary'],
    ['SN-07', 'dnv-os-e301-spiral-rope', 100, 4.270207e7, 'DNV-OS-E301 2018, secondary'],
    ['SN-07', 'dnv-os-e301-spiral-rope', 200, 1.532869e6, 'DNV-OS-E301 2018, secondary'],
    ['SN-08', 'dnv-os-e301-stranded-rope', 100, 3.4e6, 'DNV-OS-E301 2018, secondary'],
    ['SN-12', 'asce-19-six-strand-rope', 0.2, 144_530.1, 'ASCE/SEI 19-16 appendix D, published'],
    ['SN-12', 'api-older-six-strand-rope', 0.2, 528_086, 'ASCE/SEI 19-16 appendix D, published'],
    ['SN-13', 'dnv-rp-c203-2016-d-air', 100, 1.458814e6, 'DNV-RP-C203 2016 Table 2-1, secondary'],
    ['SN-13', 'dnv-rp-c203-2016-d-air', 40, 3.94185e7, 'DNV-RP-C203 2016 Table 2-1, secondary'],
    ['SN-14', 'dnv-rp-c203-2016-f-air', 80, 1.398718e6, 'DNV-RP-C203 2016 Table 2-1, secondary'],
    ['SN-14', 'dnv-rp-c203-2016-w3-air', 50, 7.466034e5, 'DNV-RP-C203 2016 Table 2-1, secondary'],
    ['SN-14', 'dnv-rp-c203-2016-b1-air', 200, 8.182387e5, 'DNV-RP-C203 2016 Table 2-1, secondary'],
    ['2.6', 'dnv-rp-c203-2016-c-air', 150, 1.158047e6, 'DNV-RP-C203 2016 Table 2-1, secondary'],
    ['SN-15', 'dnv-rp-c203-2016-d-free-corrosion', 100, 4.864072e5, 'DNV-RP-C203 2016 Table 2-4, secondary'],
    ['SN-15', 'dnv-rp-c203-2016-w3-free-corrosion', 50, 2.489373e5, 'DNV-RP-C203 2016 Table 2-4, secondary'],
    ['SN-17', 'bs-7608-d-mean', 100, 3.987494e6, 'class-society rules, secondary'],
    ['SN-17', 'bs-7608-d-design', 100, 1.519498e6, 'class-society rules, secondary'],
    ['SN-18', 'dnv-os-e301-polyester-rope', 0.3, 2.826491e6, 'DNV-OS-E301 2018, secondary'],
    ['2.3', 'dnv-os-e301-polyester-rope', 0.4, 5.88264e4, 'DNV-OS-E301 2018, secondary'],
    ['2.3', 'dnv-os-e301-stranded-rope', 200, 2.125e5, 'DNV-OS-E301 2018, secondary'],
  ])('%s: %s at %s (%s cycles; %s)', (_row, id, range, cycles) => {
    expectRelative(cyclesToFailure(curve(id), range), cycles);
  });

  it('SN-03: category 71 does no damage below its cut-off of 28.73 MPa', () => {
    expect(cyclesToFailure(curve('en-1993-1-9-71'), 28)).toBe(Infinity);
  });

  it('SN-05: size factor of a 36 mm thread (EN 1993-1-9 detail 14, secondary)', () => {
    const rule = curve('en-1993-1-9-50').threadSize;
    expect(rule).not.toBeNull();
    expectRelative(1 / threadSizeFactor(36, rule!), 0.955443);
  });

  it('SN-07: stress at 2 million cycles (DNV-OS-E301 2018, secondary)', () => {
    expectRelative(rangeForCycles(curve('dnv-os-e301-spiral-rope'), 2e6), 189.2179);
    expectRelative(rangeForCycles(curve('dnv-os-e301-stranded-rope'), 2e6), 114.19, 5e-5);
  });

  it.each([
    ['SN-09', 'api-rp-2sk-spiral-strand', 0.2, 0.3, 5.633762e5],
    ['SN-09', 'api-rp-2sk-spiral-strand', 0.15, 0.3, 2.408458e6],
    ['SN-10', 'api-rp-2sk-stranded-rope', 0.2, 0.2, 3.168016e5],
    ['2.4', 'api-rp-2sk-spiral-strand', 0.05, 0.2, 1.362076e9],
    ['2.4', 'api-rp-2sk-spiral-strand', 0.1, 0.2, 4.111497e7],
    ['2.4', 'api-rp-2sk-spiral-strand', 0.3, 0.3, 7.27005e4],
    ['2.4', 'api-rp-2sk-stranded-rope', 0.05, 0.2, 9.18782e7],
    ['2.4', 'api-rp-2sk-stranded-rope', 0.3, 0.3, 3.17376e4],
  ])(
    '%s: %s at range %s, mean %s (API RP 2SK 3rd edition 2005, secondary)',
    (_row, id, range, mean, cycles) => {
      expectRelative(cyclesToFailureAtMean(curve(id), range, mean), cycles, 2e-6);
    },
  );

  it('SN-16: 50 mm plate of class D (DNV-RP-C203 2016, secondary)', () => {
    const d = curve('dnv-rp-c203-2016-d-air');
    const factor = thicknessFactor(50, d.thickness!);
    expectRelative(factor, 1.148698);
    expectRelative(cyclesToFailure(d, 100 * factor), 9.624584e5);
  });

  it('SN-17: the shift leads from the design curve to the mean one', () => {
    const shifted = shiftToMean(curve('bs-7608-d-design'));
    expectRelative(cyclesToFailure({ segments: shifted }, 100), 3.987494e6);
  });

  it('MD-10: one stay, four curves (derived, section 2.9; A_m 38.20 mm2, breaking load 52.78 kN)', () => {
    const counts = [
      { range: 8, mean: 6, count: 1e4 },
      { range: 5, mean: 6, count: 1e5 },
      { range: 3, mean: 6, count: 1e6 },
    ];
    const spiral = curve('api-rp-2sk-spiral-strand');
    const api = counts.reduce(
      (sum, { range, mean, count }) =>
        sum + count / cyclesToFailureAtMean(spiral, range / 52.78, mean / 52.78),
      0,
    );
    expectRelative(api, 0.002650118);
    const wire = 1000 / 38.2;
    expectRelative(
      damageOfCounts(counts, { factor: wire, curve: curve('dnv-os-e301-spiral-rope') }),
      0.02400469,
    );
    expectRelative(damageOfCounts(counts, { factor: wire, curve: curve('en-1993-1-11-150') }), 0.05136961);
    // M12: tensile stress area 84.3 mm2.
    expectRelative(
      damageOfCounts(counts, { factor: 1000 / 84.3, curve: curve('en-1993-1-9-50') }),
      0.2858693,
    );
  });
});

describe('tables of the curves as shipped', () => {
  // EN 1993-1-9: category, knee, cut-off, log a (m = 3), log a (m = 5); derived, section 2.5.
  it.each([
    [160, 117.89, 64.75, 12.9134, 17.0563],
    [140, 103.15, 56.66, 12.7394, 16.7664],
    [125, 92.1, 50.59, 12.5918, 16.5203],
    [112, 82.52, 45.33, 12.4487, 16.2818],
    [100, 73.68, 40.47, 12.301, 16.0357],
    [90, 66.31, 36.42, 12.1638, 15.8069],
    [80, 58.94, 32.38, 12.0103, 15.5512],
    [71, 52.31, 28.73, 11.8548, 15.292],
    [63, 46.42, 25.5, 11.6991, 15.0324],
    [56, 41.26, 22.66, 11.5456, 14.7767],
    [50, 36.84, 20.24, 11.3979, 14.5306],
    [45, 33.16, 18.21, 11.2607, 14.3018],
    [40, 29.47, 16.19, 11.1072, 14.046],
    [36, 26.53, 14.57, 10.9699, 13.8172],
  ])('EN 1993-1-9 category %i', (category, knee, cutOff, upper, lower) => {
    const { segments, cutOffRange } = curve(`en-1993-1-9-${category}`);
    expect(Math.abs(segments[0].above - knee)).toBeLessThan(0.0051);
    expect(Math.abs(segments[1].above - cutOff)).toBeLessThan(0.0051);
    expect(cutOffRange).toBe(segments[1].above);
    expect(Math.abs(segments[0].log10a - upper)).toBeLessThan(5.1e-5);
    expect(Math.abs(segments[1].log10a - lower)).toBeLessThan(5.1e-5);
    expect(segments.map((segment) => segment.m)).toEqual([3, 5]);
  });

  it.each([
    ['en-1993-1-9-63', 'normal-stress', 63],
    ['en-1993-1-9-shear-100', 'shear-stress', 100],
    ['en-1993-1-9-shear-80', 'shear-stress', 80],
    ['en-1993-1-11-160', 'tension-component', 160],
    ['estimate-strand-terminal-112', 'tension-component', 112],
    ['estimate-strand-terminal-125', 'tension-component', 125],
    ['estimate-rod-head-50', 'normal-stress', 50],
    ['estimate-rod-head-63', 'normal-stress', 63],
    ['estimate-rod-head-71', 'normal-stress', 71],
  ] as const)('%s is the %s curve through %i, drawn by another program', (id, family, category) => {
    const expected = categoryCurve(family, category).segments;
    curve(id).segments.forEach((segment, i) => {
      expect(segment.m).toBe(expected[i].m);
      expect(segment.log10a).toBeCloseTo(expected[i].log10a, 9);
      expect(segment.above).toBeCloseTo(expected[i].above, 7);
    });
  });

  // Limit at 1e7 cycles in air, DNV-RP-C203 (2016) Table 2-1 (secondary); constants there are rounded to 3 decimals.
  it.each([
    ['b1', 106.97],
    ['b2', 93.59],
    ['c', 73.1],
    ['c1', 65.5],
    ['c2', 58.48],
    ['d', 52.63],
    ['e', 46.78],
    ['f', 41.52],
    ['f1', 36.84],
    ['f3', 32.75],
    ['g', 29.24],
    ['w1', 26.32],
    ['w2', 23.39],
    ['w3', 21.05],
  ])('DNV-RP-C203 2016 class %s: knee in air at %s MPa and ten million cycles', (name, limit) => {
    const air = curve(`dnv-rp-c203-2016-${name}-air`);
    expectRelative(air.segments[0].above, limit, 1.5e-3);
    expectRelative(cyclesToFailure(air, air.segments[0].above), 1e7, 6e-3);
    const protectedCurve = curve(`dnv-rp-c203-2016-${name}-cathodic-protection`);
    expectRelative(cyclesToFailure(protectedCurve, protectedCurve.segments[0].above), 1e6, 6e-3);
    expect(protectedCurve.segments[1]).toEqual(air.segments[1]);
    expect(curve(`dnv-rp-c203-2016-${name}-free-corrosion`).segments).toHaveLength(1);
  });

  it.each([
    ['b1', 127.21],
    ['b2', 111.3],
    ['c', 96.21],
    ['c1', 86.2],
    ['c2', 76.97],
  ])('DNV-RP-C203 2024 class %s: knee at %s MPa and five million cycles', (name, limit) => {
    const air = curve(`dnv-rp-c203-2024-${name}-air`);
    expectRelative(air.segments[0].above, limit, 1.5e-3);
    expectRelative(cyclesToFailure(air, air.segments[0].above), 5e6, 6e-3);
  });

  // BS 7608: design constant and range at ten million cycles; B, C, D secondary, the others from memory.
  it.each([
    ['b', 1.013e15, 100.3],
    ['c', 4.227e13, 78.2],
    ['d', 1.519e12, 53.4],
    ['e', 1.035e12, 47],
    ['f', 6.315e11, 39.8],
    ['f2', 4.307e11, 35.1],
    ['g', 2.477e11, 29.2],
    ['w', 1.574e11, 25.1],
  ])('BS 7608 class %s: design constant %s, %s MPa at ten million cycles', (name, constant, range) => {
    const design = curve(`bs-7608-${name}-design`);
    expectRelative(10 ** design.segments[0].log10a, constant, 1e-3);
    expectRelative(design.segments[0].above, range, 2.5e-3);
    expect(design.segments[1].m).toBe(design.segments[0].m + 2);
    const corrosive = curve(`bs-7608-${name}-corrosive`);
    expectRelative(10 ** corrosive.segments[0].log10a, constant / 2, 1e-3);
    expect(corrosive.segments).toHaveLength(1);
  });

  it.each([
    ['en-1993-1-9-160', 'dnv-rp-c203-2016-d-free-corrosion'],
    ['dnv-rp-c203-2016-d-air', 'dnv-rp-c203-2016-d-free-corrosion'],
  ])('corrosion never helps: %s lives longer than %s', (dry, wet) => {
    for (const range of [10, 60, 100, 300]) {
      expect(cyclesToFailure(curve(dry), range)).toBeGreaterThan(cyclesToFailure(curve(wet), range));
    }
  });
});
