import {
  constructionsFileSchema,
  materialsFileSchema,
  replacementRulesFileSchema,
  terminalsFileSchema,
  threadsFileSchema,
} from '@stayledger/shared/contracts/constructions';
import { curvesFileSchema } from '@stayledger/shared/contracts/curves';
import { TERMINALS } from '@stayledger/shared/contracts/parts';
import { curveProblems } from '@stayledger/shared/fatigue/curves/curve-problems';
import { knees } from '@stayledger/shared/fatigue/curves/knees';
import { assertMeanRuleAllowed } from '@stayledger/shared/fatigue/damage/assert-mean-rule-allowed';
import { MeanRuleRefusedError } from '@stayledger/shared/fatigue/damage/mean-rule-refused-error';
import type { Construction } from '@stayledger/shared/rig/constructions';
import { defaultDetails } from '@stayledger/shared/rig/default-details';
import { detailModelOf } from '@stayledger/shared/rig/detail-model-of';
import { describe, expect, it } from 'vitest';
import constructionsFile from './constructions.json' with { type: 'json' };
import curvesFile from './curves.json' with { type: 'json' };
import materialsFile from './materials.json' with { type: 'json' };
import rulesFile from './replacement-rules.json' with { type: 'json' };
import terminalsFile from './terminals.json' with { type: 'json' };
import threadsFile from './threads.json' with { type: 'json' };

const { curves } = curvesFileSchema.parse(curvesFile);
const constructions: Construction[] = constructionsFileSchema.parse(constructionsFile).constructions;
const { materials } = materialsFileSchema.parse(materialsFile);
const { rules } = replacementRulesFileSchema.parse(rulesFile);
const { terminals } = terminalsFileSchema.parse(terminalsFile);
const { threads } = threadsFileSchema.parse(threadsFile);

const KN_PER_LBF = 4.4482216152605e-3;

function construction(id: string): Construction {
  const found = constructions.find((candidate) => candidate.id === id);
  if (found === undefined) throw new Error(`There is no construction ${id}.`);
  return found;
}

function size(id: string, designation: string): Construction['sizes'][number] {
  const found = construction(id).sizes.find((candidate) => candidate.designation === designation);
  if (found === undefined) throw new Error(`${id} has no size ${designation}.`);
  return found;
}

describe('every file', () => {
  it.each([
    ['curves.json', curves],
    ['constructions.json', constructions],
    ['materials.json', materials],
    ['replacement-rules.json', rules],
    ['terminals.json', terminals],
  ])('%s names each row once', (_file, rows) => {
    const keys = rows.map((row) => `${row.id}@${row.version}`);
    expect(keys.length).toBeGreaterThan(0);
    expect(new Set(keys).size).toBe(keys.length);
  });

  it('threads.json names each thread once', () => {
    expect(new Set(threads.map((thread) => thread.designation)).size).toBe(threads.length);
  });

  it('keeps keys of one file known to the next', () => {
    const materialIds = new Set(materials.map((material) => material.id));
    const ruleIds = new Set(rules.map((rule) => rule.id));
    for (const { id, materialId, replacementRuleId } of constructions) {
      expect(materialIds.has(materialId), `${id}: ${materialId}`).toBe(true);
      if (replacementRuleId !== null)
        expect(ruleIds.has(replacementRuleId), `${id}: ${replacementRuleId}`).toBe(true);
    }
    expect(terminals.map((terminal) => terminal.id).sort()).toEqual([...TERMINALS].sort());
  });

  it('ends every sentence a person reads', () => {
    for (const row of [...curves, ...constructions, ...materials, ...rules, ...terminals]) {
      expect(row.provenanceNote, row.id).toMatch(/[.]$/);
    }
  });
});

describe('curves', () => {
  it.each(curves.map((curve) => [curve.id, curve] as const))(
    '%s is sound and meets itself at its knees',
    (_id, curve) => {
      expect(curveProblems(curve)).toEqual([]);
      for (const knee of knees(curve)) {
        if (knee.cyclesBelow !== Infinity)
          expect(Math.abs(knee.cyclesBelow / knee.cyclesAbove - 1)).toBeLessThan(1e-9);
      }
      expect(curve.cutOffRange ?? 0).toBe(curve.segments.at(-1)?.above);
      // Steeper below than above, so that no curve promises more for a larger range.
      const slopes = curve.segments.map((segment) => segment.m);
      expect(slopes).toEqual([...slopes].sort((a, b) => a - b));
    },
  );

  it('states a level with its k, and none without', () => {
    for (const { id, level, k } of curves) {
      const expected = { mean: 0, unknown: 0, 'mean-minus-k-sd': 2, 'fractile-95-75': 1.645 }[level];
      expect(k, id).toBe(expected);
    }
  });

  it('refuses a mean rule on every curve measured under tension', () => {
    for (const curve of curves) {
      expect(() => assertMeanRuleAllowed(curve, { kind: 'goodman', ultimate: 1500 }), curve.id).toThrow(
        MeanRuleRefusedError,
      );
    }
  });

  it('never offers second opinions, mean curves or polyester as the curve of a part', () => {
    const offered = curves.filter((curve) => curve.selectable).map((curve) => curve.id);
    expect(offered.filter((id) => /^(api|asce|iso)-|polyester|-mean$/.test(id))).toEqual([]);
    for (const curve of curves.filter((candidate) => candidate.id.includes('polyester'))) {
      expect(curve.analogyNote).toContain('not for HMPE');
    }
  });

  it('marks estimates as estimates, with the scatter assumed for them', () => {
    for (const curve of curves) {
      expect(curve.provenance === 'estimate', curve.id).toBe(curve.id.startsWith('estimate-'));
      if (curve.provenance === 'estimate') expect(curve).toMatchObject({ level: 'unknown', sdLog10N: 0.25 });
    }
  });
});

describe('constructions against the tables they came from', () => {
  // Metallic areas of ETA-10/0358 annex 2 (secondary), breaking loads of section 6.2 at grade 1570 and 1370.
  it.each([
    ['6 mm', 21.49, 29.7, 25.9, 0.177, 2794],
    ['8 mm', 38.2, 52.8, 46.1, 0.314, 4966],
    ['10 mm', 59.69, 82.5, 72, 0.491, 7760],
    ['12 mm', 85.95, 118.8, 103.6, 0.706, 11_174],
    ['14 mm', 116.99, 161.6, 141, 0.962, 15_209],
    ['22 mm', 288.9, 399.1, 348.3, 2.375, 37_557],
  ])('1x19 316 of %s', (designation, area, upperKn, lowerKn, mass, stiffness) => {
    const row = size('strand-1x19-316', designation);
    expect(Math.abs(row.metallicAreaMm2 - area)).toBeLessThan(0.011);
    expect(row.breakingLoads.map((load) => load.gradeMpa)).toEqual([1370, 1570]);
    expect(Math.abs(row.breakingLoads[0].breakingLoadKn - lowerKn)).toBeLessThan(0.06);
    expect(Math.abs(row.breakingLoads[1].breakingLoadKn - upperKn)).toBeLessThan(0.06);
    expect(Math.abs(row.massKgPerM - mass)).toBeLessThan(0.00051);
    expect(Math.abs(row.axialStiffnessKn - stiffness)).toBeLessThan(0.6);
  });

  it.each([
    ['strand-1x19-galvanised-1770', '8 mm', 38.2, 59.5, 5730],
    ['strand-1x19-compacted-316', '8 mm', 44.23, 53.3, 5883],
    ['strand-1x19-compacted-316', '22 mm', 334.52, 403.3, 44_491],
    ['rope-7x19-316', '8 mm', 28.15, 36.4, 2533],
    ['rope-7x7-316', '12 mm', 63.33, 87.7, 5700],
  ])('%s of %s (sections 6.2 to 6.5)', (id, designation, area, lowestKn, stiffness) => {
    const row = size(id, designation);
    expect(Math.abs(row.metallicAreaMm2 - area)).toBeLessThan(0.011);
    expect(Math.abs(row.breakingLoads[0].breakingLoadKn - lowestKn)).toBeLessThan(0.06);
    expect(Math.abs(row.axialStiffnessKn - stiffness)).toBeLessThan(0.6);
  });

  it.each([
    ['6 mm', 21.2, 0.124],
    ['10 mm', 58.8, 0.345],
    ['16 mm', 150, 0.883],
  ])('6x7 with fibre core of %s (ISO 10425 Table C.1, published)', (designation, kn, mass) => {
    const row = size('rope-6x7-fibre-core-galvanised-1770', designation);
    expect(row.breakingLoads).toEqual([{ gradeMpa: 1770, breakingLoadKn: kn }]);
    expect(row.massKgPerM).toBe(mass);
  });

  it.each([
    ['-4', 4.37, 14.99, 4700, 0.118, 2893],
    ['-10', 6.35, 31.67, 10_300, 0.25, 6112],
    ['-48', 14.3, 160.61, 48_000, 1.266, 30_998],
    ['-115', 22.22, 387.95, 115_000, 3.057, 74_874],
  ])('rod %s (section 6.6, trade memory)', (designation, diameter, area, lbf, mass, stiffness) => {
    const row = size('rod-s20910', designation);
    expect(Math.abs(row.diameterMm - diameter)).toBeLessThan(0.0101);
    expect(Math.abs(row.metallicAreaMm2 - area)).toBeLessThan(0.011);
    expect(Math.abs(row.breakingLoads[0].breakingLoadKn / KN_PER_LBF / lbf - 1)).toBeLessThan(1e-3);
    expect(Math.abs(row.massKgPerM - mass)).toBeLessThan(0.0011);
    expect(Math.abs(row.axialStiffnessKn - stiffness)).toBeLessThan(1.1);
  });

  it.each([
    ['1/4 in', 6.35, 6523, 6900],
    ['1/2 in', 12.7, 25_000, 26_093],
  ])(
    '1x19 316 of %s: lowest of the formula and the trade figure first (section 6.3)',
    (designation, diameter, low, next) => {
      const row = size('strand-1x19-316-inch', designation);
      expect(row.diameterMm).toBe(diameter);
      expect(Math.abs(row.breakingLoads[0].breakingLoadKn / KN_PER_LBF / low - 1)).toBeLessThan(1e-3);
      expect(Math.abs(row.breakingLoads[1].breakingLoadKn / KN_PER_LBF / next - 1)).toBeLessThan(1e-3);
    },
  );

  it('lists breaking loads from low to high and sizes from thin to thick', () => {
    for (const { id, sizes } of constructions) {
      for (const row of sizes) {
        const loads = row.breakingLoads.map((load) => load.breakingLoadKn);
        expect(loads, `${id} ${row.designation}`).toEqual([...loads].sort((a, b) => a - b));
      }
      const diameters = sizes.map((row) => row.diameterMm);
      expect(diameters, id).toEqual([...diameters].sort((a, b) => a - b));
    }
  });

  it('has strengths, densities and stiffness that a material of that name can have', () => {
    for (const { id, materialId, fillFactor, youngGpa, sizes } of constructions) {
      const material = materials.find((candidate) => candidate.id === materialId);
      if (material === undefined) throw new Error(`${id}: no material ${materialId}`);
      for (const row of sizes) {
        const area = (fillFactor * Math.PI * row.diameterMm ** 2) / 4;
        expect(Math.abs(row.metallicAreaMm2 / area - 1), `${id} ${row.designation}`).toBeLessThan(5e-3);
        expect(
          Math.abs(row.axialStiffnessKn / (youngGpa * area) - 1),
          `${id} ${row.designation}`,
        ).toBeLessThan(5e-3);
        const lay = (row.massKgPerM * 1000) / (row.metallicAreaMm2 * material.densityKgPerDm3);
        expect(lay, `${id} ${row.designation}`).toBeGreaterThan(0.99);
        expect(lay, `${id} ${row.designation}`).toBeLessThan(1.12);
        for (const { breakingLoadKn } of row.breakingLoads) {
          expect((breakingLoadKn * 1000) / row.metallicAreaMm2, `${id} ${row.designation}`).toBeLessThan(
            material.strengthMpa[1] * 1.01,
          );
        }
      }
    }
  });
});

describe('threads', () => {
  // Nominal stress areas printed in ISO 898-1 (from memory), to its three digits.
  it.each([
    ['M6', 20.1],
    ['M8', 36.6],
    ['M10', 58],
    ['M12', 84.3],
    ['M16', 157],
    ['M20', 245],
    ['M24', 353],
    ['M30', 561],
    ['M36', 817],
  ])('%s has %s mm2', (designation, area) => {
    const thread = threads.find((candidate) => candidate.designation === designation);
    expect(Math.abs((thread?.tensileStressAreaMm2 ?? 0) / area - 1)).toBeLessThan(3e-3);
  });

  // Tensile stress areas printed in ASME B1.1 (from memory), square inches.
  it.each([
    ['1/4-28 UNF', 0.0364],
    ['3/8-24 UNF', 0.0878],
    ['1/2-20 UNF', 0.1599],
    ['3/4-16 UNF', 0.373],
  ])('%s has %s square inches', (designation, area) => {
    const thread = threads.find((candidate) => candidate.designation === designation);
    expect(Math.abs((thread?.tensileStressAreaMm2 ?? 0) / 645.16 / area - 1)).toBeLessThan(3e-3);
  });
});

describe('replacement rules', () => {
  it('never give hard use more years than general, or general more than light', () => {
    for (const { id, years, limitYears } of rules) {
      expect(years.hard, id).toBeLessThanOrEqual(years.general);
      expect(years.general, id).toBeLessThanOrEqual(years.light);
      if (limitYears !== null) expect(years.light, id).toBeLessThanOrEqual(limitYears);
    }
  });
});

describe('defaults of a part', () => {
  const described = {
    thread: { designation: 'M12', diameterMm: 12, tensileStressAreaMm2: 84.3 },
    pinDiameterMm: 12,
    chainplate: null,
    lossDropsMast: true,
  };

  it.each(constructions.map((row) => [row.id, row] as const))(
    '%s points at curves that exist',
    (_id, row) => {
      for (const upperTerminal of TERMINALS) {
        const details = defaultDetails({
          ...described,
          construction: row.kind,
          metallicAreaMm2: row.sizes[0].metallicAreaMm2,
          youngMpa: row.youngGpa * 1000,
          upperTerminal,
          lowerTerminal: row.kind === 'rod' ? 'cold-head' : 'swaged',
        });
        expect(details).toHaveLength(row.kind === 'fibre' ? 0 : 6);
        for (const detail of details.filter((candidate) => candidate.curveId !== null)) {
          const curve = curves.find(
            (one) => one.id === detail.curveId && one.version === detail.curveVersion,
          );
          if (curve === undefined)
            throw new Error(`No curve ${detail.curveId} version ${detail.curveVersion}.`);
          expect(curve.selectable).toBe(true);
          expect(detailModelOf(detail, curve)?.curve.segments.length).toBeGreaterThan(0);
        }
      }
    },
  );
});
