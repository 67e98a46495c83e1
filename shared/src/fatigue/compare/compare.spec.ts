import { describe, expect, it } from 'vitest';
import type { ReferenceCurve } from '../curves/curve.js';
import { damageOfSpectrum } from '../damage/damage-of-spectrum.js';
import type { LoadSpectrum } from '../rainflow/load-spectrum.js';
import { spectrumOf } from '../rainflow/spectrum-of.js';
import { normalSource } from '../statistics/normal-source.js';
import { randomStreams } from '../statistics/random-streams.js';
import { seededRandom } from '../statistics/seeded-random.js';
import { type Candidate, compareCandidates, type CompareSetting } from './compare-candidates.js';
import { compareHistory } from './compare-history.js';
import { historyDamage } from './history-damage.js';
import { knockOns } from './knock-ons.js';
import { loadShare } from './load-share.js';

/** An invented curve of two slopes at mean minus two standard deviations. */
const CURVE: ReferenceCurve = {
  id: 'invented',
  version: 1,
  name: 'Invented',
  appliesTo: 'nothing',
  measure: 'stress-metallic',
  level: 'mean-minus-k-sd',
  k: 2,
  sdLog10N: 0.2,
  environment: 'air',
  segments: [
    { above: 150, m: 4, log10a: Math.log10(2e6) + 4 * Math.log10(150) },
    { above: 0, m: 6, log10a: Math.log10(2e6) + 6 * Math.log10(150) },
  ],
  meanLoad: { kind: 'none', reason: 'measured under tension' },
  thickness: null,
  threadSize: null,
  cutOffRange: null,
  validity: { minRange: null, maxRange: null, note: '' },
  source: 'made for this test',
  provenance: 'derived',
  provenanceNote: '',
  analogyNote: '',
  selectable: false,
};
const ONE_SLOPE: ReferenceCurve = { ...CURVE, segments: [{ above: 0, m: 4, log10a: 15 }] };

function modelOn(areaMm2: number, curve: ReferenceCurve = CURVE): Candidate['details'][number]['model'] {
  return {
    factor: 1000 / areaMm2,
    stressConcentration: 1,
    sizeFactor: 1,
    lifeDivisor: 1,
    cutOff: 'none',
    mean: { kind: 'none' },
    endBending: null,
    curve,
  };
}

/** A rough passage: swell in groups on slow changes, with noise. */
function passage(samples: number, seed: number): LoadSpectrum {
  const normal = normalSource(seededRandom(seed));
  const loads = Float64Array.from({ length: samples }, (_, i) => {
    const group = 3 + 2 * Math.sin(i / 400);
    return Math.max(0, 9 + 3 * Math.sin(i / 2900) + group * Math.sin(i * 1.1) + 0.4 * normal());
  });
  return spectrumOf(loads, { step: 0.01 });
}

const spectrum = passage(60_000, 1);
const history = compareHistory(spectrum, 10);

const setting: CompareSetting = {
  history,
  plannedHoursPerYear: 500,
  gainCov: 0.05,
  lengthM: 14,
  middleHeightM: 8,
  stretchLoadKn: 10,
  recordedStiffnessKn: 5000,
  parallelStiffnessKn: 8000,
  dockKn: 6,
  targetProbability: 0.01,
};

function candidate(id: string, areaMm2: number, more: Partial<Candidate> = {}): Candidate {
  return {
    id,
    name: id,
    kindOfWire: 'strand',
    details: [{ name: 'free length', model: modelOn(areaMm2), modelSdLog10N: 0 }],
    notAssessedDetails: [],
    breakingLoadKn: 50,
    stiffnessKn: 5000,
    massKgPerM: 0.3,
    costMinor: 120_000,
    calendarYears: 10,
    ...more,
  };
}

describe('a history pressed for comparing', () => {
  it.each([
    ['two slopes', modelOn(38)],
    ['one slope', modelOn(38, ONE_SLOPE)],
    [
      'bending at a fixed end',
      { ...modelOn(38), endBending: { fixedMisalignmentRad: 0.0044, swingRad: 0.002, youngMpa: 130_000 } },
    ],
    ['a mean-load rule', { ...modelOn(38), mean: { kind: 'goodman', ultimate: 1500 } as const }],
  ])('keeps the damage within 0.1 %% with %s', (_, model) => {
    const full = damageOfSpectrum(spectrum, model).damage;
    const pressed = historyDamage(history, model, 1, 0.1);
    expect(Math.abs(pressed.total[4] / full - 1)).toBeLessThan(1e-3);
    const higher = damageOfSpectrum(spectrum, { ...model, sizeFactor: Math.exp(2 * pressed.lnStep) }).damage;
    expect(Math.abs(pressed.total[6] / higher - 1)).toBeLessThan(1e-3);
  });

  it('keeps the highest load and all cycles', () => {
    const cycles = damageOfSpectrum(spectrum, modelOn(38)).histogram.reduce(
      (sum, { count }) => sum + count,
      0,
    );
    expect(history.count.reduce((sum, count) => sum + count, 0)).toBeCloseTo(cycles, 6);
    let highest = 0;
    for (const { cycles: table } of spectrum.days)
      for (const high of table.high) highest = Math.max(highest, high);
    for (const level of spectrum.residue) highest = Math.max(highest, level);
    expect(history.highestKn).toBeCloseTo(highest * 0.01, 12);
    expect(() => compareHistory(spectrum, 0)).toThrow(RangeError);
  });

  it('lets a gain do less than a factor on the range where bending grows with the root of the load', () => {
    const bending = { fixedMisalignmentRad: 0.01, swingRad: 0, youngMpa: 130_000 };
    expect(historyDamage(history, { ...modelOn(38), endBending: bending }, 1, 0.1).rangePerGain).toBeLessThan(
      1,
    );
    expect(historyDamage(history, modelOn(38), 1, 0.1).rangePerGain).toBe(1);
  });
});

describe('comparing candidates', () => {
  const compare = (candidates: Candidate[], more: Partial<CompareSetting> = {}, draws = 4000) =>
    compareCandidates(candidates, { ...setting, ...more }, randomStreams(1), draws);

  it('gives lives in the ratio of the areas to the power of the slope, on one slope', () => {
    const thick = candidate('thick', 60, {
      details: [{ name: 'wire', model: modelOn(60, ONE_SLOPE), modelSdLog10N: 0 }],
    });
    const thin = candidate('thin', 40, {
      details: [{ name: 'wire', model: modelOn(40, ONE_SLOPE), modelSdLog10N: 0 }],
    });
    const { candidates } = compare([thick, thin], {}, 20_000);
    const ratio = (candidates[0].lifeYears?.median ?? 0) / (candidates[1].lifeYears?.median ?? 1);
    // (60 / 40)^4 = 5.0625; the medians of 20,000 draws of spread 0.63 are each good to 0.6 %.
    expect(Math.abs(ratio / 5.0625 - 1)).toBeLessThan(0.03);
  });

  it('has the closed median: mean curve, Miner sum, gain and stress of mean one', () => {
    const one = candidate('one', 40, {
      details: [{ name: 'wire', model: modelOn(40, ONE_SLOPE), modelSdLog10N: 0 }],
    });
    const [{ lifeYears }] = compare([one], {}, 20_000).candidates;
    // Design damage of 10 h, shifted by 10^(2 * 0.2); medians 1/sqrt(1.09) and (1 + cov^2)^(-1/2) to the power 4.
    const design = damageOfSpectrum(spectrum, modelOn(40, ONE_SLOPE)).damage;
    const perYear = (design / 10 ** 0.4) * 50 * (1.0025 * 1.01) ** -2;
    expect(Math.abs((lifeYears?.median ?? 0) / (1 / Math.sqrt(1.09) / perYear) - 1)).toBeLessThan(0.03);
  });

  it('does not separate a candidate from its like, and separates one twice as thick', () => {
    const { pairs } = compare([candidate('a', 38), candidate('b', 38), candidate('c', 76)]);
    expect(pairs.map(({ oneId, otherId }) => oneId + otherId)).toEqual(['ab', 'ac', 'bc']);
    expect(pairs[0].verdict).toBe('not-separated');
    // Two independent and alike: half of the draws, standard error 0.008.
    expect(Math.abs(pairs[0].oneLongerShare - 0.5)).toBeLessThan(0.032);
    expect(pairs[0].words).toContain('do not separate');
    expect(pairs[1]).toMatchObject({ verdict: 'other-longer' });
    expect(pairs[1].words).toMatch(/^c lasts longer/);
  });

  it('draws common loads once: doubt about them does not blur a comparison', () => {
    const pair = [candidate('a', 38), candidate('b', 46)];
    const sure = compare(pair, { gainCov: 0.01 }).pairs[0].oneLongerShare;
    const unsure = compare(pair, { gainCov: 0.2 }).pairs[0].oneLongerShare;
    expect(Math.abs(sure - unsure)).toBeLessThan(0.03);
  });

  it('takes the whole assembly: a weak thread governs and shortens', () => {
    const wire = candidate('wire', 60);
    const withThread = candidate('with-thread', 60, {
      details: [...wire.details, { name: 'turnbuckle thread', model: modelOn(35), modelSdLog10N: 0 }],
    });
    const [alone, whole] = compare([wire, withThread]).candidates;
    expect(whole.governingDetail).toBe('turnbuckle thread');
    expect(whole.lifeYears?.median ?? 0).toBeLessThan(alone.lifeYears?.median ?? 0);
  });

  it('shifts by the curve alone and spreads by doubt: a borrowed curve has the same median and a wider range', () => {
    const own = candidate('own', 38);
    const borrowed = candidate('borrowed', 38, { details: [{ ...own.details[0], modelSdLog10N: 0.25 }] });
    const [a, b] = compare([own, borrowed], {}, 20_000).candidates.map(({ lifeYears }) => lifeYears);
    expect(Math.abs((a?.median ?? 0) / (b?.median ?? 1) - 1)).toBeLessThan(0.05);
    expect((b?.p95 ?? 0) / (b?.p05 ?? 1)).toBeGreaterThan(1.5 * ((a?.p95 ?? 0) / (a?.p05 ?? 1)));
  });

  it('shows clocks only for fibre', () => {
    const fibre = candidate('fibre', 0, {
      kindOfWire: 'fibre',
      details: [],
      calendarYears: 6,
      stiffnessKn: 3000,
    });
    const { candidates, pairs } = compare([candidate('a', 38), fibre]);
    expect(candidates[1]).toMatchObject({ lifeYears: null, planningYears: null, governingDetail: null });
    expect(candidates[1].words).toContain('no usable curve');
    // 120,000 over six years.
    expect(candidates[1].costPerYearMinor).toBe(20_000);
    expect(candidates[1].share.caveat).toContain('softer');
    expect(pairs).toEqual([]);
  });

  it('states what can be weighed and measured (hand)', () => {
    const [row] = compare([candidate('a', 38)]).candidates;
    // 10 kN * 14 m / 5000 kN = 28 mm; 0.3 * 14 = 4.2 kg; 4.2 * 8 = 33.6 kg m.
    expect(row.stretchMm).toBeCloseTo(28, 9);
    expect(row.massKg).toBeCloseTo(4.2, 9);
    expect(row.weightAloftKgM).toBeCloseTo(33.6, 9);
    expect(row.strengthMargin).toBeCloseTo(50 / history.highestKn, 9);
    const [unknown] = compare([candidate('a', 38, { breakingLoadKn: null, costMinor: null })]).candidates;
    expect(unknown).toMatchObject({ strengthMargin: null, costPerYearMinor: null });
  });

  it('refuses a comparison without planned hours', () => {
    expect(() => compare([candidate('a', 38)], { plannedHoursPerYear: 0 })).toThrow(RangeError);
  });
});

describe('stiffness', () => {
  it('moves load to the stiffer path (hand: 5000 to 7500 beside 8000: 1.5 * 13000 / 15500)', () => {
    const share = loadShare(5000, 7500, 8000);
    expect(share.loadFactor).toBeCloseTo(1.2580645, 6);
    expect(share.caveat).toContain('50 % stiffer');
    expect(share.caveat).toContain('1.26');
  });

  it('says nothing up to 15 %, and says that it does not know without neighbours', () => {
    expect(loadShare(5000, 5750, 8000).caveat).toBeNull();
    const unknown = loadShare(5000, 2500, null);
    expect(unknown.loadFactor).toBe(1);
    expect(unknown.caveat).toContain('not known');
    expect(() => loadShare(0, 1, 1)).toThrow(RangeError);
  });
});

describe('knock-ons', () => {
  const around = {
    pinDiameterMm: 12,
    thread: 'M12',
    toggleKn: 60,
    chainplateHoleMm: 12.3,
    chainplateKn: 80,
    tangHoleMm: 12.2,
    tangKn: 80,
  };

  it('are none for a stay of the same fittings', () => {
    expect(knockOns(around, { breakingLoadKn: 50, pinDiameterMm: 12, thread: 'M12' })).toEqual([]);
  });

  it('name pin, thread, holes and what would become the weakest link', () => {
    const list = knockOns(around, { breakingLoadKn: 70, pinDiameterMm: 14, thread: 'M16' });
    expect(list.map(({ item }) => item)).toEqual(['pin', 'chainplate-hole', 'mast-tang', 'thread', 'toggle']);
    expect(list.every(({ unknown }) => !unknown)).toBe(true);
    const smaller = knockOns(around, { breakingLoadKn: 50, pinDiameterMm: 10, thread: 'M12' });
    expect(smaller.map(({ words }) => words).join(' ')).toContain('bush');
  });

  it('ask for what is not known', () => {
    const nothing = {
      pinDiameterMm: null,
      thread: null,
      toggleKn: null,
      chainplateHoleMm: null,
      chainplateKn: null,
      tangHoleMm: null,
      tangKn: null,
    };
    const list = knockOns(nothing, { breakingLoadKn: 50, pinDiameterMm: 12, thread: 'M12' });
    expect(list.every(({ unknown }) => unknown)).toBe(true);
    expect(new Set(list.map(({ item }) => item)).size).toBe(6);
    expect(knockOns(around, { breakingLoadKn: 50, pinDiameterMm: null, thread: null })).toHaveLength(2);
  });
});
