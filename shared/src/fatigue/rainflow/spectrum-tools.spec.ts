import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { astmCounts } from './astm-counts.js';
import { closeTies } from './close-ties.js';
import { coarsenSpectrum } from './coarsen-spectrum.js';
import { commonStep } from './common-step.js';
import { cycleTableOf } from './cycle-table.js';
import { dropSmallRanges } from './drop-small-ranges.js';
import { insertTurningPoint } from './insert-turning-point.js';
import { emptySpectrum } from './load-spectrum.js';
import { mapAffine } from './map-affine.js';
import { mergeAll, mergeSpectra } from './merge-spectra.js';
import { mergeCycleTables } from './merge-cycle-tables.js';
import { RainflowCounter } from './rainflow-counter.js';
import { decodeSpectrum, encodeSpectrum } from './spectrum-codec.js';
import { spectrumOf } from './spectrum-of.js';

describe('edges of a history', () => {
  it('of no samples leave nothing', () => {
    expect(spectrumOf([])).toEqual(emptySpectrum(0));
    expect(spectrumOf([NaN, NaN], { step: 0.1 })).toEqual(emptySpectrum(0.1));
    expect(astmCounts(emptySpectrum(0))).toEqual([]);
  });

  it('of one load leave one turning point and no range', () => {
    for (const loads of [[7], [7, 7, 7], [NaN, 7, NaN]]) {
      const spectrum = spectrumOf(loads);
      expect([...spectrum.residue]).toEqual([7]);
      expect(spectrum.turningPoints).toBe(1);
      expect(astmCounts(spectrum)).toEqual([]);
    }
  });

  it('of a monotone history leave one half cycle', () => {
    expect(astmCounts(spectrumOf([-3, 0, 2, 2, 9]))).toEqual([{ range: 12, mean: 3, count: 0.5 }]);
  });

  it('refuse an infinite load and a step that is none', () => {
    expect(() => spectrumOf([1, Infinity, 2])).toThrow(/infinite/);
    expect(() => spectrumOf([0, 1, -Infinity])).toThrow(/infinite/);
    for (const step of [-1, NaN, Infinity]) {
      expect(() => new RainflowCounter({ step })).toThrow(/step/);
    }
  });
});

describe('hostile loads', () => {
  it('at the ends of what a double holds are counted exactly', () => {
    const tiny = Number.MIN_VALUE;
    expect(astmCounts(spectrumOf([0, 3 * tiny, tiny, 4 * tiny]))).toEqual([
      { range: 2 * tiny, mean: 2 * tiny, count: 1 },
      { range: 4 * tiny, mean: 2 * tiny, count: 0.5 },
    ]);
    expect(closeTies(spectrumOf([0, 1e9, 1e9 - 1e-7, 2e9])).closedCycles).toBe(1);
    expect(closeTies(spectrumOf([0, 0.1 + 0.2, 0.3, 1])).closedCycles).toBe(1);
  });

  it('of 10^9 kN on a grid of 0.001 kN keep their levels', () => {
    const spectrum = spectrumOf([0, 1e9, -1e9, 5e8, 0], { step: 0.001 });
    expect([...spectrum.residue]).toEqual([0, 1e12, -1e12, 5e11, 0]);
    const closing = spectrumOf([0, 1e9, 5e8, 2e9, 0], { step: 0.001 });
    expect([...closing.days[0].cycles.low, ...closing.days[0].cycles.high]).toEqual([5e11, 1e12]);
    expect(decodeSpectrum(encodeSpectrum(closing))).toEqual(closing);
  });

  it('make no difference between 0 and -0', () => {
    const spectrum = spectrumOf([1, -0, 2, 0, 3, -0, 1]);
    expect(encodeSpectrum(spectrum)).toEqual(encodeSpectrum(spectrumOf([1, 0, 2, -0, 3, 0, 1])));
    expect(spectrumOf([-0, 1]).residue).toEqual(Float64Array.of(0, 1));
    expect(spectrumOf([-0.2, 1], { step: 1 }).residue).toEqual(Float64Array.of(0, 1));
  });

  it('that diverge and converge over a million points close nothing and lose nothing', () => {
    const half = 500_000;
    const loads = Float64Array.from({ length: 2 * half }, (_, i) => {
      const size = i < half ? i + 1 : 2 * half - i - 0.5;
      return i % 2 === 0 ? size : -size;
    });
    const spectrum = spectrumOf(loads);
    expect(spectrum.days).toEqual([]);
    // Compared one by one: the matcher would take seconds for a million numbers.
    expect(spectrum.residue).toHaveLength(loads.length);
    expect(spectrum.residue.every((load, i) => load === loads[i])).toBe(true);
    const merged = mergeSpectra(spectrumOf(loads.subarray(0, 777_777)), spectrumOf(loads.subarray(777_777)));
    expect(merged.days).toEqual([]);
    expect(merged.residue.every((load, i) => load === loads[i])).toBe(true);
    expect(merged.residue).toHaveLength(loads.length);
  });

  it('may need more than 65,535 cycles of one kind', () => {
    const loads = Float64Array.from({ length: 400_001 }, (_, i) => i % 2);
    const { closedCycles, residue } = closeTies(spectrumOf(loads, { step: 1 }));
    // 400,000 ranges: all but the two of the residue make whole cycles of two ranges each.
    expect(residue).toEqual([0, 1, 0]);
    expect(closedCycles).toBe(199_999);
  });
});

describe('grids', () => {
  it('meet on the coarsest that holds both', () => {
    expect(commonStep(0.1, 0.02)).toBe(0.02);
    expect(commonStep(0.05, 0.02)).toBe(0.01);
    expect(commonStep(0.0103, 0.01)).toBe(0.0001);
    expect(commonStep(1e-7, 0.5)).toBe(1e-7);
    expect(commonStep(0.1, 0)).toBe(0);
  });

  it('merge to the count of the joined history', () => {
    const coarse = [0, 1.5, 0.5, 2];
    const fine = [2, 0.25, 1.75, 0.3];
    const merged = mergeSpectra(spectrumOf(coarse, { step: 0.5 }), spectrumOf(fine, { step: 0.05 }));
    expect(merged).toEqual(spectrumOf([...coarse, ...fine], { step: 0.05 }));
    const exact = mergeSpectra(spectrumOf(coarse, { step: 0.5 }), spectrumOf(fine));
    expect(exact).toEqual(spectrumOf([...coarse, ...fine]));
  });

  it('merge without a grid when a common one would be too fine for whole levels', () => {
    const merged = mergeSpectra(spectrumOf([0, 1e9], { step: 0.1 }), spectrumOf([0, 1], { step: 1e-12 }));
    expect(merged.step).toBe(0);
    expect([...merged.residue]).toEqual([0, 1e9, 0, 1]);
  });

  it('merge in any grouping also when they differ', () => {
    const parts = [0.5, 0.2, 0.05, 0.5].map((step, i) =>
      spectrumOf([i, 4 - i, i + 1, 6 - i, 2], { step, day: i }),
    );
    const left = parts.reduce((one, two) => mergeSpectra(one, two));
    const right = parts.reduceRight((two, one) => mergeSpectra(one, two));
    expect(encodeSpectrum(left)).toEqual(encodeSpectrum(right));
    expect(encodeSpectrum(left)).toEqual(encodeSpectrum(mergeAll(parts)));
  });

  it('can be made coarser with the count of the rounded history', () => {
    const loads = [0, 1.04, 0.52, 0.98, 0.2, 3.3, 1.31, 2.9, 2.86, 3.6, -1];
    const coarse = coarsenSpectrum(spectrumOf(loads), 0.5);
    const expected = spectrumOf(
      loads.map((load) => Math.round(load / 0.5)),
      { step: 1 },
    );
    expect({ ...coarse, step: 1, turningPoints: 0 }).toEqual({ ...expected, turningPoints: 0 });
  });
});

describe('tables of cycles', () => {
  const table = (pairs: [number, number, number][]) => cycleTableOf(...columnsOf(pairs));
  const columnsOf = (pairs: [number, number, number][]): [number[], number[], number[]] => [
    pairs.map(([low]) => low),
    pairs.map(([, high]) => high),
    pairs.map(([, , count]) => count),
  ];

  it('add up the same whether long and short, alike or many', () => {
    const pair = fc.tuple(
      fc.integer({ min: 0, max: 9 }),
      fc.integer({ min: 10, max: 20 }),
      fc.integer({ min: 1, max: 5 }),
    );
    const sized = fc.oneof(
      fc.array(pair, { maxLength: 4 }),
      fc.array(pair, { minLength: 60, maxLength: 200 }),
    );
    fc.assert(
      fc.property(fc.array(sized, { maxLength: 5 }), (parts) => {
        const sums = new Map<string, number>();
        for (const [low, high, count] of parts.flat()) {
          sums.set(`${low} ${high}`, (sums.get(`${low} ${high}`) ?? 0) + count);
        }
        const merged = mergeCycleTables(parts.map(table));
        const keys = Array.from(merged.low, (low, i) => `${low} ${merged.high[i]}`);
        expect(new Map(keys.map((key, i) => [key, merged.count[i]]))).toEqual(sums);
        expect(keys).toHaveLength(sums.size);
        const ascending = [...merged.low.keys()].slice(1).every((i) => {
          const [before, after] = [i - 1, i].map((at) => merged.low[at] * 100 + merged.high[at]);
          return before < after;
        });
        expect(ascending).toBe(true);
      }),
    );
  });
});

describe('dropping small ranges', () => {
  // By hand: of 0, 1, 0.6, 2, -1, -0.7, -3, 4 the cycles 1 to 0.6 and -1 to -0.7 close; 0, 2, -3, 4 is left.
  it('drops closed cycles and the ends of the residue', () => {
    const spectrum = spectrumOf([0, 1, 0.6, 2, -1, -0.7, -3, 4]);
    expect(closeTies(spectrum)).toEqual({ closedCycles: 2, residue: [0, 2, -3, 4] });
    expect(closeTies(dropSmallRanges(spectrum, 0.35)).closedCycles).toBe(1);
    expect(closeTies(dropSmallRanges(spectrum, 0.5))).toEqual({ closedCycles: 0, residue: [0, 2, -3, 4] });
    expect([...dropSmallRanges(spectrum, 3).residue]).toEqual([2, -3, 4]);
    expect([...dropSmallRanges(spectrum, 8).residue]).toHaveLength(1);
    expect(dropSmallRanges(spectrum, 0)).toBe(spectrum);
  });

  it('keeps a range exactly at the threshold on a grid, though 0.57 / 0.01 is no whole number in doubles', () => {
    const spectrum = spectrumOf([0, 0.9, 0.33, 1], { step: 0.01 });
    expect(0.57 / 0.01).not.toBe(57);
    expect(closeTies(dropSmallRanges(spectrum, 0.57)).closedCycles).toBe(1);
    expect(closeTies(dropSmallRanges(spectrum, 0.58)).closedCycles).toBe(0);
  });
});

describe('gain and zero', () => {
  const loads = [0, 10, 4, 12, -2, 7];

  it('map a spectrum to that of the corrected history', () => {
    const corrected = loads.map((load) => 1.5 * load - 3);
    expect(mapAffine(spectrumOf(loads), { gain: 1.5, zero: -3 })).toEqual(spectrumOf(corrected));
    const onGrid = mapAffine(spectrumOf(loads, { step: 1 }), { gain: 1.5, zero: -3 });
    expect(onGrid).toEqual(spectrumOf(corrected, { step: 1.5 }));
    expect(mapAffine(spectrumOf(loads, { step: 0.01 }), { gain: 1.03, zero: 0 }).step).toBe(0.0103);
  });

  it('give up the grid for a zero between its levels', () => {
    const mapped = mapAffine(spectrumOf(loads, { step: 1 }), { gain: 1, zero: 0.25 });
    expect(mapped).toEqual(spectrumOf(loads.map((load) => load + 0.25)));
  });

  it('refuse a gain that turns loads round', () => {
    for (const gain of [0, -1, NaN, Infinity]) {
      expect(() => mapAffine(spectrumOf(loads), { gain, zero: 0 })).toThrow(/gain/);
    }
  });
});

describe('a known load that was not recorded', () => {
  it('makes setting up a new part its first range', () => {
    const fresh = insertTurningPoint(emptySpectrum(0.01), { load: 0, day: 100 });
    const sailed = mergeSpectra(fresh, spectrumOf([8, 12, 9], { step: 0.01, day: 101 }));
    const stepped = insertTurningPoint(sailed, { load: 0, day: 102 });
    expect(astmCounts(stepped)).toEqual(astmCounts(spectrumOf([0, 8, 12, 9, 0], { step: 0.01 })));
    expect(stepped.samples).toBe(3);
    expect([...stepped.residueDay]).toEqual([100, 101, 102]);
  });
});

describe('a stored spectrum', () => {
  it('of another version is refused by its number', () => {
    const bytes = encodeSpectrum(spectrumOf([0, 5, 1]));
    bytes[0] = 9;
    expect(() => decodeSpectrum(bytes)).toThrow(/version 9/);
  });

  it('does not depend on how the same counts were made', () => {
    const days = [4, 4, 4, 5, 5, 5, 5, 5];
    const loads = [0, 5, 2, 6, 1, 4, 2, 7];
    const oneByOne = new RainflowCounter({ step: 0.5 });
    loads.forEach((load, i) => oneByOne.push(Float64Array.of(load), 1, days[i]));
    expect(encodeSpectrum(oneByOne.spectrum())).toEqual(
      encodeSpectrum(spectrumOf(loads, { step: 0.5, day: days })),
    );
  });

  it('takes few bytes for an ordinary day', () => {
    // A day at 1 Hz of swell on a shroud, on a grid of 0.05 kN.
    const loads = Float64Array.from({ length: 86_400 }, (_, i) => {
      return 12 + 4 * Math.sin(i / 1.6) * Math.sin(i / 97) + 2 * Math.sin(i / 5000);
    });
    const spectrum = spectrumOf(loads, { step: 0.05, day: 19_000 });
    const bins = spectrum.days[0].cycles.count.length;
    expect(encodeSpectrum(spectrum).length).toBeLessThan(4 * bins + 200);
  });
});
