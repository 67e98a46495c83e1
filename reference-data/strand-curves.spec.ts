import { curvesFileSchema } from '@stayledger/shared/contracts/curves';
import { describe, expect, it } from 'vitest';
import type { ReferenceCurve } from '@stayledger/shared/fatigue/curves/curve';
import { CycleEvaluator } from '@stayledger/shared/fatigue/damage/cycle-evaluator';
import { freeLengthOn, strandCurveIds } from '@stayledger/shared/rig/strand-curves';
import curvesFile from './curves.json' with { type: 'json' };

const CURVES: ReferenceCurve[] = curvesFileSchema.parse(curvesFile).curves;
const curveOf = (id: string): ReferenceCurve => {
  const found = CURVES.find((curve) => curve.id === id);
  if (!found) throw new Error(`no curve ${id}`);
  return found;
};

/** 8 mm 1x19 316: metallic area 38.20 mm2, breaking load 52.78 kN. */
const WIRE = { metallicAreaMm2: 38.2, breakingLoadKn: 52.78, lifeDivisor: 1 };
/** Blocks of a range about a mean of 6 kN. */
const MEAN_KN = 6;
const BLOCKS = [
  { rangeKn: 8, cycles: 1e4 },
  { rangeKn: 5, cycles: 1e5 },
  { rangeKn: 3, cycles: 1e6 },
];

function damageOn(id: string): number {
  const evaluator = new CycleEvaluator(freeLengthOn(curveOf(id), WIRE));
  return BLOCKS.reduce((sum, { rangeKn, cycles }) => {
    const [low, high] = [MEAN_KN - rangeKn / 2, MEAN_KN + rangeKn / 2];
    return sum + cycles * evaluator.damageOf(evaluator.rangeOf(low, high), low, high);
  }, 0);
}

describe('the strand curves side by side', () => {
  // Worked by hand from the equations of each source: EN 1993-1-11 table 9.1 and EN 1993-1-9 figure 7.1, DNV-OS-E301
  // table of steel rope, API RP 2SK (N R^M = K, K by the mean load). For DNV spiral rope: a = 1.7e17, m = 4.8, so the
  // blocks of 209.4, 130.9 and 78.5 MPa give 1e4/1.23e6 + 1e5/1.18e7 + 1e6/1.37e8 = 0.0240.
  it.each([
    ['api-rp-2sk-spiral-strand', 0.00265],
    ['dnv-os-e301-spiral-rope', 0.024005],
    ['api-rp-2sk-stranded-rope', 0.024926],
    // a = 3.4e14, m = 4: 1e4/1.768e5 + 1e5/1.158e6 + 1e6/8.954e6.
    ['dnv-os-e301-stranded-rope', 0.2546],
    ['en-1993-1-11-150', 0.05137],
  ])('gives the damage worked by hand on %s', (id, damage) => {
    expect(damageOn(id) / damage).toBeCloseTo(1, 2);
  });

  it('shows nothing beside one another for rod and fibre', () => {
    expect(strandCurveIds('rod')).toEqual([]);
    expect(strandCurveIds('fibre')).toEqual([]);
  });

  it('names only curves that are there, and refuses one of another measure', () => {
    for (const kind of ['1x19', '1x19-compacted', '7x19', '7x7', '6x7-fibre-core'] as const) {
      expect(strandCurveIds(kind).length).toBeGreaterThan(2);
      for (const id of strandCurveIds(kind)) expect(() => freeLengthOn(curveOf(id), WIRE)).not.toThrow();
    }
    expect(() => freeLengthOn(curveOf('en-1993-1-9-50'), WIRE)).toThrow(RangeError);
  });
});
