import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { CurveMeanLoad, ReferenceCurve } from '../curves/curve.js';
import { assertMeanRuleAllowed } from './assert-mean-rule-allowed.js';
import { MeanAboveUltimateError } from './mean-above-ultimate-error.js';
import {
  amplitudeAtStressRatio,
  gerberAmplitude,
  goodmanAmplitude,
  type MeanLoadRule,
  morrowAmplitude,
  rangeAtMeanRatio,
  rangeAtReference,
  rangeAtZeroMean,
  soderbergAmplitude,
  swtAmplitude,
  walkerAmplitude,
} from './mean-load.js';
import { MeanRuleRefusedError } from './mean-rule-refused-error.js';

/** Amplitude 100, mean 400, ultimate 1500, yield 1200, true fracture strength 1700 MPa, all derived (section 3). */
describe('mean-load rules', () => {
  it('MS-01: Goodman 100 / (1 - 400/1500), Gerber 100 / (1 - (400/1500)^2)', () => {
    expect(goodmanAmplitude(100, 400, 1500)).toBeCloseTo(136.363636, 6);
    expect(gerberAmplitude(100, 400, 1500)).toBeCloseTo(107.655502, 6);
  });

  it('MS-02: Soderberg 100 / (1 - 400/1200), Morrow 100 / (1 - 400/1700)', () => {
    expect(soderbergAmplitude(100, 400, 1200)).toBeCloseTo(150, 9);
    expect(morrowAmplitude(100, 400, 1700)).toBeCloseTo(130.769231, 6);
  });

  it('MS-03: Smith-Watson-Topper sqrt(500 * 100), Walker 500^0.35 * 100^0.65', () => {
    expect(swtAmplitude(100, 400)).toBeCloseTo(223.606798, 6);
    expect(walkerAmplitude(100, 400, 0.65)).toBeCloseTo(175.6465, 4);
  });

  it('MS-04: 136.3636 reversed, referred to R = 0.1 and R = 0 along Goodman', () => {
    expect(amplitudeAtStressRatio(136.363636, 1500, 0.1)).toBeCloseTo(122.727273, 5);
    expect(amplitudeAtStressRatio(136.363636, 1500, 0)).toBeCloseTo(125, 5);
  });

  it('MS-05: load range 0.20 moved from a mean of 0.15 to 0.30', () => {
    expect(rangeAtMeanRatio(0.2, 0.15, 0.3)).toBeCloseTo(0.1647059, 7);
    expect(() => rangeAtMeanRatio(0.2, 1, 0.3)).toThrow(MeanAboveUltimateError);
    expect(() => rangeAtMeanRatio(0.2, 0.3, 1)).toThrow(MeanAboveUltimateError);
  });

  it('earns no credit from compression under any rule', () => {
    const rules: MeanLoadRule[] = [
      { kind: 'none' },
      { kind: 'goodman', ultimate: 50 },
      { kind: 'gerber', ultimate: 50 },
      { kind: 'walker', gamma: 0.65 },
    ];
    for (const rule of rules) {
      expect(rangeAtZeroMean(10, -5, rule)).toBe(10);
      expect(rangeAtZeroMean(10, 0, rule)).toBe(10);
    }
  });

  it('refuses a mean at or above the ultimate, naming both', () => {
    expect(() => rangeAtZeroMean(1, 50, { kind: 'goodman', ultimate: 50 })).toThrow(MeanAboveUltimateError);
    expect(() => rangeAtZeroMean(1, 51, { kind: 'gerber', ultimate: 50 })).toThrow(/51.*50/);
    expect(() => soderbergAmplitude(1, 1200, 1200)).toThrow(MeanAboveUltimateError);
  });

  it('lies in the order Gerber, Goodman, Soderberg for a tensile mean', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 500, noNaN: true }),
        fc.double({ min: 1, max: 1000, noNaN: true }),
        (amplitude, mean) => {
          const gerber = gerberAmplitude(amplitude, mean, 1500);
          const goodman = goodmanAmplitude(amplitude, mean, 1500);
          expect(gerber).toBeGreaterThan(amplitude * (1 - 1e-12));
          expect(goodman).toBeGreaterThan(gerber);
          expect(soderbergAmplitude(amplitude, mean, 1200)).toBeGreaterThan(goodman);
        },
      ),
    );
  });

  it('refuses an impossible gamma or stress ratio', () => {
    expect(() => walkerAmplitude(1, 1, 1.1)).toThrow(RangeError);
    expect(() => amplitudeAtStressRatio(1, 10, 1)).toThrow(RangeError);
    expect(() => rangeAtReference(1, 1, { kind: 'none' }, 1)).toThrow(RangeError);
  });
});

describe('referring to the stress ratio of the tests', () => {
  const rules: MeanLoadRule[] = [
    { kind: 'goodman', ultimate: 1500 },
    { kind: 'gerber', ultimate: 1500 },
    { kind: 'walker', gamma: 0.65 },
  ];

  it.each(rules)('$kind leaves a cycle alone that already has that ratio', (rule) => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 400, noNaN: true }),
        fc.double({ min: -1, max: 0.5, noNaN: true }),
        (range, ratio) => {
          const mean = (range / 2) * ((1 + ratio) / (1 - ratio));
          expect(rangeAtReference(range, mean, rule, ratio) / range).toBeCloseTo(1, 9);
        },
      ),
    );
  });

  it.each(rules)('$kind at R = -1 is the range at zero mean', (rule) => {
    expect(rangeAtReference(200, 400, rule, -1)).toBeCloseTo(rangeAtZeroMean(200, 400, rule), 9);
  });

  it('does nothing without a rule', () => {
    expect(rangeAtReference(200, 400, { kind: 'none' }, 0.1)).toBe(200);
  });
});

describe('refusal of mean rules', () => {
  const curve = (meanLoad: CurveMeanLoad): ReferenceCurve => ({
    id: 'test-curve',
    version: 1,
    name: 'Test curve',
    appliesTo: 'tests',
    measure: 'stress-nominal',
    level: 'mean',
    k: 0,
    sdLog10N: 0.2,
    environment: 'air',
    segments: [{ above: 0, m: 3, log10a: 12 }],
    meanLoad,
    thickness: null,
    threadSize: null,
    cutOffRange: null,
    validity: { minRange: null, maxRange: null, note: '' },
    source: 'test',
    provenance: 'derived',
    provenanceNote: 'test',
    analogyNote: 'test',
    selectable: true,
  });
  const goodman: MeanLoadRule = { kind: 'goodman', ultimate: 1500 };

  it('refuses a second correction, saying why', () => {
    const welded = curve({ kind: 'none', reason: 'the mean is in the tests.' });
    expect(() => assertMeanRuleAllowed(welded, goodman)).toThrow(MeanRuleRefusedError);
    expect(() => assertMeanRuleAllowed(welded, goodman)).toThrow(
      /goodman.*test-curve.*the mean is in the tests/,
    );
    const wire = curve({
      kind: 'load-ratio-exponent',
      perMeanRatio: 3,
      minRatio: 0,
      maxRatio: 0.6,
      reason: 'it has its own term.',
    });
    expect(() => assertMeanRuleAllowed(wire, goodman)).toThrow(MeanRuleRefusedError);
  });

  it('lets no rule pass anywhere, and a rule pass where the tests state their ratio', () => {
    expect(() => assertMeanRuleAllowed(curve({ kind: 'none', reason: 'x' }), { kind: 'none' })).not.toThrow();
    const bar = curve({ kind: 'rule-allowed', referenceR: -1, reason: 'rotating bending' });
    expect(() => assertMeanRuleAllowed(bar, goodman)).not.toThrow();
  });
});
