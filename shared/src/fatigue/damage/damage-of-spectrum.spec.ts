import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { categoryCurve } from '../curves/category-curve.js';
import type { ReferenceCurve } from '../curves/curve.js';
import { cyclesToFailureAtMean } from '../curves/cycles-to-failure-at-mean.js';
import { astmCounts } from '../rainflow/astm-counts.js';
import { emptySpectrum, type LoadSpectrum } from '../rainflow/load-spectrum.js';
import { mergeSpectra } from '../rainflow/merge-spectra.js';
import { spectrumOf } from '../rainflow/spectrum-of.js';
import { damageOfCounts } from './damage-of-counts.js';
import { damageOfSpectrum } from './damage-of-spectrum.js';
import type { DetailModel } from './detail-model.js';
import { MeanAboveUltimateError } from './mean-above-ultimate-error.js';

function expectRelative(actual: number, expected: number, tolerance = 1e-9): void {
  if (expected === 0) expect(actual).toBe(0);
  else expect(Math.abs(actual / expected - 1)).toBeLessThan(tolerance);
}

const cubic: DetailModel = {
  factor: 1,
  stressConcentration: 1,
  sizeFactor: 1,
  lifeDivisor: 1,
  cutOff: 'as-curve',
  curve: { segments: [{ above: 0, m: 3, log10a: 0 }] },
  mean: { kind: 'none' },
  endBending: null,
};

/** The example of ASTM E1049-85 section 5.4.4 (published). */
const ASTM = [-2, 1, -3, 5, -1, 3, -4, 4, -2];

describe('damage of a spectrum', () => {
  it('splits the ASTM E1049-85 example into closed cycles and residue (RF-03, RF-05)', () => {
    // Closed: (-1, 3), range 4: 64. In all 1094, so the residue halves hold 1030.
    const damage = damageOfSpectrum(spectrumOf(ASTM), cubic);
    expectRelative(damage.closed, 64);
    expectRelative(damage.residue, 1030);
    expectRelative(damage.damage, 1094);
    expectRelative(damage.largestRange, 9);
  });

  it('is the same on a grid as on free doubles', () => {
    const onGrid = damageOfSpectrum(spectrumOf(ASTM, { step: 0.5 }), cubic);
    expectRelative(onGrid.damage, 1094);
    expectRelative(onGrid.closed, 64);
    expectRelative(onGrid.largestRange, 9);
  });

  it('gives a cycle to the day of its higher extreme (hand)', () => {
    // Day 10: 0, 5, 1. Day 11: 4, 0. Closed: (1, 4), range 3, its higher extreme on day 11: 27.
    // Residue 0, 5, 0: two halves of 125, the higher extreme of both on day 10.
    const spectrum = spectrumOf([0, 5, 1, 4, 0], { step: 1, day: [10, 10, 10, 11, 11] });
    const { byDay, damage } = damageOfSpectrum(spectrum, cubic);
    expect(byDay).toEqual([
      { day: 10, damage: expect.closeTo(125, 9) },
      { day: 11, damage: expect.closeTo(27, 9) },
    ]);
    expectRelative(damage, 152);
  });

  it('applies stress concentration and size factor to the range, the divisor to the life (hand)', () => {
    // One pair 0, 10: half a cycle of 10 * 2 * 1.5 * 1.2 = 36; life divided by 3: 0.5 * 36^3 * 3 = 69984.
    const damage = damageOfSpectrum(spectrumOf([0, 10]), {
      ...cubic,
      factor: 2,
      stressConcentration: 1.5,
      sizeFactor: 1.2,
      lifeDivisor: 3,
    });
    expectRelative(damage.damage, 69_984);
  });

  it('counts below a cut-off only where none is trusted', () => {
    const detail: DetailModel = { ...cubic, curve: categoryCurve('normal-stress', 71) };
    const spectrum = spectrumOf([0, 20, 0], { step: 1 });
    expect(damageOfSpectrum(spectrum, detail).damage).toBe(0);
    // Hand: one cycle of 20 MPa on 1e8 * (28.7346 / 20)^5 cycles.
    const open = damageOfSpectrum(spectrum, { ...detail, cutOff: 'none' });
    expectRelative(open.damage, 1 / (1e8 * (28.7346 / 20) ** 5), 1e-4);
  });

  it('adds bending at a fixed end to each cycle (hand)', () => {
    // Half a cycle from 100 to 400 MPa with 0.01 rad: (300 + 72.11103)^3 / 2 = 25 762 757.
    const damage = damageOfSpectrum(spectrumOf([100, 400]), {
      ...cubic,
      endBending: { fixedMisalignmentRad: 0.01, swingRad: 0, youngMpa: 130_000 },
    });
    expectRelative(damage.damage, 372.11103 ** 3 / 2, 1e-7);
    expectRelative(damage.largestRange, 372.11103, 1e-7);
  });

  it('moves ranges to zero mean, and refuses a mean at the ultimate', () => {
    // Half a cycle of 20 about 25 with an ultimate of 50: S_eq = 40, 40^3 / 2 = 32000.
    const detail: DetailModel = { ...cubic, mean: { kind: 'goodman', ultimate: 50 } };
    expectRelative(damageOfSpectrum(spectrumOf([15, 35]), detail).damage, 32_000);
    expect(() => damageOfSpectrum(spectrumOf([49, 51]), detail)).toThrow(MeanAboveUltimateError);
  });

  it('is empty for an empty spectrum and for a single sample', () => {
    for (const spectrum of [emptySpectrum(0.01), emptySpectrum(0), spectrumOf([7])]) {
      expect(damageOfSpectrum(spectrum, cubic)).toMatchObject({
        damage: 0,
        closed: 0,
        residue: 0,
        byDay: [],
        largestRange: 0,
        histogram: [],
      });
    }
  });
});

describe('curves with a mean-load term and a validity', () => {
  const spiral: ReferenceCurve = {
    id: 'test-spiral',
    version: 1,
    name: 'API RP 2SK spiral strand',
    appliesTo: 'spiral strand',
    measure: 'load-ratio',
    level: 'unknown',
    k: 0,
    sdLog10N: null,
    environment: 'corrosion-protected',
    segments: [{ above: 0, m: 5.05, log10a: 3.25 }],
    meanLoad: {
      kind: 'load-ratio-exponent',
      perMeanRatio: 3.43,
      minRatio: 0,
      maxRatio: 0.6,
      reason: 'own term',
    },
    thickness: null,
    threadSize: null,
    cutOffRange: null,
    validity: { minRange: null, maxRange: 0.5, note: '' },
    source: 'API RP 2SK, 3rd edition (2005), secondary',
    provenance: 'published, secondary',
    provenanceNote: 'test',
    analogyNote: 'test',
    selectable: false,
  };
  const detail: DetailModel = { ...cubic, factor: 1 / 100, curve: spiral };

  it('takes each cycle at its own mean', () => {
    // 20 kN about 30 kN on 100 kN: N = 563 376 (SN-09), half a cycle. 10 kN about 20 kN: N = 4.111497e7 (table of 2.4).
    expectRelative(damageOfSpectrum(spectrumOf([20, 40]), detail).damage, 0.5 / 5.633762e5, 1e-6);
    expectRelative(
      damageOfSpectrum(spectrumOf([15, 25], { step: 0.5 }), detail).damage,
      0.5 / 4.111497e7,
      1e-6,
    );
  });

  it('reports cycles larger than the tests support', () => {
    // 0-60-10 kN on 100 kN: halves of 0.6 and 0.5; only the first is above the bound of 0.5.
    const { rangeAboveValidity } = damageOfSpectrum(spectrumOf([0, 60, 10]), detail);
    expect(rangeAboveValidity.limit).toBe(0.5);
    expect(rangeAboveValidity.cycles).toBe(0.5);
    expectRelative(rangeAboveValidity.damage, 0.5 / cyclesToFailureAtMean(spiral, 0.6, 0.3));
    expect(damageOfSpectrum(spectrumOf([0, 60]), cubic).rangeAboveValidity).toEqual({
      limit: null,
      cycles: 0,
      damage: 0,
    });
  });
});

describe('properties', () => {
  const loads = fc.array(fc.integer({ min: -20, max: 120 }), { maxLength: 200 });
  const details: DetailModel[] = [
    cubic,
    { ...cubic, factor: 3, curve: categoryCurve('normal-stress', 71) },
    { ...cubic, factor: 3, curve: categoryCurve('tension-component', 150), cutOff: 'none', lifeDivisor: 2 },
    {
      ...cubic,
      factor: 3,
      endBending: { fixedMisalignmentRad: 0.005, swingRad: 0.001, youngMpa: 130_000 },
    },
  ];

  it('equals the sum over the ASTM counts where only range and mean matter', () => {
    fc.assert(
      fc.property(loads, fc.constantFrom(0, 0.5, 1), (history, step) => {
        const spectrum = spectrumOf(history, { step });
        const counts = astmCounts(spectrum);
        for (const detail of details.slice(0, 2)) {
          expectRelative(damageOfSpectrum(spectrum, detail).damage, damageOfCounts(counts, detail));
        }
        const goodman: DetailModel = { ...details[1], mean: { kind: 'goodman', ultimate: 1000 } };
        expectRelative(damageOfSpectrum(spectrum, goodman).damage, damageOfCounts(counts, goodman));
      }),
    );
  });

  it('gives the same on a grid and on free doubles, by day and in all', () => {
    fc.assert(
      fc.property(loads, (history) => {
        const day = history.map((_, i) => Math.floor(i / 7));
        for (const detail of details) {
          const onGrid = damageOfSpectrum(spectrumOf(history, { step: 1, day }), detail);
          const free = damageOfSpectrum(spectrumOf(history, { step: 0, day }), detail);
          expectRelative(onGrid.damage, free.damage);
          expect(onGrid.byDay.map(({ day: number }) => number)).toEqual(
            free.byDay.map(({ day: number }) => number),
          );
          onGrid.byDay.forEach(({ damage }, i) => expectRelative(damage, free.byDay[i].damage));
        }
      }),
    );
  });

  it('adds up: days to the total, bins to the total and to the cycles', () => {
    fc.assert(
      fc.property(loads, fc.constantFrom(0, 1), (history, step) => {
        const spectrum = spectrumOf(history, { step, day: history.map((_, i) => Math.floor(i / 5)) });
        for (const detail of details) {
          const result = damageOfSpectrum(spectrum, detail);
          expectRelative(sum(result.byDay.map((day) => day.damage)), result.damage);
          expectRelative(result.closed + result.residue, result.damage);
          if (result.largestRange === 0) continue;
          expectRelative(sum(result.histogram.map((bin) => bin.damage)), result.damage);
          expectRelative(sum(result.histogram.map((bin) => bin.count)), cyclesIn(spectrum));
          for (const bin of result.histogram) {
            expect(bin.range).toBeGreaterThanOrEqual(bin.low * (1 - 1e-12));
            expect(bin.range).toBeLessThanOrEqual(bin.high * (1 + 1e-12));
          }
        }
      }),
    );
  });

  it('does not depend on where a history was cut', () => {
    fc.assert(
      fc.property(loads, fc.nat(), (history, cut) => {
        const at = history.length === 0 ? 0 : cut % history.length;
        const step = 1;
        const merged = mergeSpectra(
          spectrumOf(history.slice(0, at), { step }),
          spectrumOf(history.slice(at), { step }),
        );
        for (const detail of details) {
          expect(damageOfSpectrum(merged, detail).damage).toBe(
            damageOfSpectrum(spectrumOf(history, { step }), detail).damage,
          );
        }
      }),
    );
  });
});

function sum(values: number[]): number {
  return values.reduce((a, b) => a + b, 0);
}

function cyclesIn(spectrum: LoadSpectrum): number {
  let cycles = Math.max(spectrum.residue.length - 1, 0) / 2;
  for (const day of spectrum.days) cycles += sum(Array.from(day.cycles.count));
  return cycles;
}
