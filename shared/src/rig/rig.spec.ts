import { describe, expect, it } from 'vitest';
import { assemblyStrength } from './assembly-strength.js';
import {
  axialStiffnessKn,
  type ConstructionSize,
  constructionSize,
  knownBreakingLoad,
  massKgPerM,
  metallicAreaMm2,
  ropeBreakingLoadKn,
  ropeFactor,
  strandBreakingLoadKn,
} from './constructions.js';
import { PERMISSIBLE_SHARE, safetyFactorOfShare } from './permissible-load-factor.js';
import { POSITION_KINDS, positionKind, positionLabel } from './positions.js';
import { rightingMomentLoadKn } from './righting-moment-load.js';
import { stayFrequencyHz } from './stay-frequency.js';

const KN_PER_LBF = 4.4482216152605e-3;

describe('constructions', () => {
  it('GE-01: 8 mm 1x19, grade 1570, spinning loss 0.88 (EN 1993-1-11 Table 2.2, secondary)', () => {
    const area = metallicAreaMm2(0.76, 8);
    expect(area).toBeCloseTo(38.2018, 4);
    expect(strandBreakingLoadKn(area, 1570, 0.88)).toBeCloseTo(52.7796, 4);
  });

  it('GE-02: factor of 6x7 with fibre core from 58.8 kN at 10 mm, grade 1770 (ISO 10425 Table C.1, published)', () => {
    expect(ropeFactor(58.8, 10, 1770)).toBeCloseTo(0.3322, 5);
    expect(ropeBreakingLoadKn(0.3322, 10, 1770)).toBeCloseTo(58.8, 2);
  });

  it('mass and stiffness of 8 mm 1x19 316 (table of section 6.2, derived)', () => {
    expect(massKgPerM(metallicAreaMm2(0.76, 8), 7.98, 1.03)).toBeCloseTo(0.314, 3);
    expect(axialStiffnessKn(130, metallicAreaMm2(0.76, 8))).toBeCloseTo(4966, 0);
  });

  const size: ConstructionSize = {
    designation: '8 mm',
    diameterMm: 8,
    metallicAreaMm2: 38.2,
    breakingLoads: [
      { gradeMpa: 1370, breakingLoadKn: 46.1 },
      { gradeMpa: 1570, breakingLoadKn: 52.8 },
    ],
    massKgPerM: 0.314,
    axialStiffnessKn: 4966,
  };

  it('believes the certificate first, else the lower grade of the table', () => {
    expect(knownBreakingLoad(size, 54.2)).toEqual({ breakingLoadKn: 54.2, source: 'certificate' });
    expect(knownBreakingLoad(size, null)).toEqual({ breakingLoadKn: 46.1, source: 'table-lower-grade' });
    expect(knownBreakingLoad({ ...size, breakingLoads: [size.breakingLoads[1]] }, null).source).toBe('table');
    expect(() => knownBreakingLoad({ ...size, breakingLoads: [] }, null)).toThrow(RangeError);
  });

  it('finds a size by its diameter, within the rounding of inch sizes', () => {
    const construction = { sizes: [size, { ...size, designation: '5/16 in', diameterMm: 7.94 }] };
    expect(constructionSize(construction, 8)?.designation).toBe('8 mm');
    expect(constructionSize(construction, 7.9375)?.designation).toBe('5/16 in');
    expect(constructionSize(construction, 7.5)).toBeUndefined();
  });
});

describe('estimates of load and frequency', () => {
  it('BE-03: stay of 12 m at 8 kN and 0.314 kg/m (derived)', () => {
    expect(stayFrequencyHz(12, 8, 0.314)).toBeCloseTo(6.650724, 6);
    expect(() => stayFrequencyHz(0, 8, 0.314)).toThrow(RangeError);
  });

  it("RG-01: 37 000 ft lbf over 4.5 ft (Skene's method, from memory)", () => {
    const momentKnm = 37_000 * 1.3558179483e-3;
    const load = rightingMomentLoadKn(momentKnm, 4.5 * 0.3048);
    expect(load / KN_PER_LBF).toBeCloseTo(12_333.33, 1);
    expect(load).toBeCloseTo(54.8614, 4);
    expect(() => rightingMomentLoadKn(1, 0)).toThrow(RangeError);
  });

  it('RG-02: class factors as safety factors (class guidance notes 2017 Table 1.7.1, published)', () => {
    expect(safetyFactorOfShare(PERMISSIBLE_SHARE.sailing)).toBeCloseTo(1.886792, 6);
    expect(safetyFactorOfShare(PERMISSIBLE_SHARE.survival)).toBeCloseTo(1.470588, 6);
    expect(() => safetyFactorOfShare(0)).toThrow(RangeError);
  });
});

describe('positions', () => {
  it('has one kind per key, in rig order', () => {
    const keys = POSITION_KINDS.map((position) => position.kind);
    expect(new Set(keys).size).toBe(keys.length);
    const orders = POSITION_KINDS.map((position) => position.order);
    expect(orders).toEqual([...orders].sort((a, b) => a - b));
    expect(new Set(orders).size).toBe(orders.length);
  });

  it('gives every alias a full word and every kind a side', () => {
    for (const position of POSITION_KINDS) {
      expect(position.name).toMatch(/^[a-z]/);
      expect(position.sides.length).toBeGreaterThan(0);
    }
    expect(positionKind('cap-shroud')).toMatchObject({ alias: 'V1', standing: true, lossDropsMast: true });
    expect(positionKind('halyard')).toMatchObject({ standing: false, lossDropsMast: false });
    expect(positionKind('sky-hook')).toBeUndefined();
  });

  it('names places as the trade does', () => {
    expect(positionLabel('cap-shroud', 'port')).toBe('Cap shroud, port');
    expect(positionLabel('forestay', 'centre')).toBe('Forestay');
    expect(positionLabel('backstay', 'centre', 'mizzen')).toBe('Mizzen backstay');
  });
});

describe('strength of an assembly', () => {
  const known = {
    wireBreakingLoadKn: 52.8,
    upperTerminalFactor: 0.9,
    lowerTerminalFactor: 1,
    turnbuckleKn: 60,
    toggleKn: 55,
    pinKn: 70,
    chainplateKn: 50,
  };

  it('is the least of its elements (hand: 52.8 * 0.9 = 47.52)', () => {
    expect(assemblyStrength(known)).toEqual({
      breakingLoadKn: expect.closeTo(47.52, 9),
      weakestElement: 'upper terminal',
      unknownElements: [],
      provisional: false,
    });
    expect(assemblyStrength({ ...known, chainplateKn: 40 }).weakestElement).toBe('chainplate');
  });

  it('names what is not known and stays provisional', () => {
    const strength = assemblyStrength({ ...known, toggleKn: null, lowerTerminalFactor: null });
    expect(strength.unknownElements).toEqual(['lower terminal', 'toggle']);
    expect(strength.provisional).toBe(true);
    expect(strength.breakingLoadKn).toBeCloseTo(47.52, 9);
  });

  it('leaves out what is not there', () => {
    const lashed = { wireBreakingLoadKn: 90, upperTerminalFactor: 0.9, lowerTerminalFactor: 0.9 };
    expect(assemblyStrength(lashed).unknownElements).toEqual([]);
  });

  it('does not know the ends of an unknown wire', () => {
    expect(
      assemblyStrength({ wireBreakingLoadKn: null, upperTerminalFactor: 0.9, lowerTerminalFactor: 1 }),
    ).toEqual({
      breakingLoadKn: null,
      weakestElement: null,
      unknownElements: ['wire', 'upper terminal', 'lower terminal'],
      provisional: true,
    });
    expect(() => assemblyStrength({ ...known, pinKn: 0 })).toThrow(/pin/);
  });
});
