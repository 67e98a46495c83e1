import { describe, expect, it } from 'vitest';
import type { ReferenceCurve } from '../fatigue/curves/curve.js';
import { MeanRuleRefusedError } from '../fatigue/damage/mean-rule-refused-error.js';
import { defaultDetails } from './default-details.js';
import { detailModelOf } from './detail-model-of.js';
import type { PartDetail, PartForDetails } from './part-detail.js';

const part: PartForDetails = {
  construction: '1x19',
  metallicAreaMm2: 38.2,
  youngMpa: 130_000,
  upperTerminal: 'swaged',
  lowerTerminal: 'mechanical',
  thread: { designation: 'M12', diameterMm: 12, tensileStressAreaMm2: 84.3 },
  pinDiameterMm: 10,
  chainplate: null,
  lossDropsMast: true,
};

function details(overrides: Partial<PartForDetails> = {}): Record<string, PartDetail> {
  return Object.fromEntries(defaultDetails({ ...part, ...overrides }).map((detail) => [detail.key, detail]));
}

describe('details of a 1x19 stay', () => {
  it('has six places that can fail by themselves', () => {
    expect(Object.keys(details())).toEqual([
      'free-length',
      'upper-terminal',
      'lower-terminal',
      'turnbuckle-thread',
      'pin',
      'chainplate',
    ]);
  });

  it('puts stress on the area that carries it (hand)', () => {
    const all = details();
    // 1000 / 38.2 MPa per kN on the wire, 1000 / 84.3 on the thread, 1000 / (2 * 78.54) on two sections of a 10 mm pin.
    expect(all['free-length'].inputs?.factor).toBeCloseTo(26.178, 3);
    expect(all['turnbuckle-thread'].inputs?.factor).toBeCloseTo(11.8624, 4);
    expect(all.pin.inputs?.factor).toBeCloseTo(6.3662, 4);
  });

  it('takes the curve of each end and doubts what is borrowed', () => {
    const all = details();
    expect(all['free-length'].curveId).toBe('en-1993-1-11-150');
    expect(all['upper-terminal']).toMatchObject({
      curveId: 'estimate-strand-terminal-112',
      modelSdLog10N: 0.25,
    });
    expect(all['lower-terminal'].curveId).toBe('estimate-strand-terminal-125');
    expect(all['turnbuckle-thread']).toMatchObject({ curveId: 'en-1993-1-9-50', modelSdLog10N: 0 });
    expect(all['upper-terminal'].estimates[0]).toContain('is an estimate');
  });

  it('trusts no fatigue limit and charges the surroundings once', () => {
    for (const detail of Object.values(details())) {
      if (detail.inputs === null) continue;
      expect(detail.inputs.cutOff).toBe('none');
      expect(detail.inputs.mean).toEqual({ kind: 'none' });
      expect(detail.inputs.lifeDivisor).toBe(detail.key === 'lower-terminal' ? 3 : 2);
    }
  });

  it('bends the ends, not the free length, and not an end that turns in both planes', () => {
    const all = details({ lowerArticulation: 'both-planes' });
    expect(all['free-length'].inputs?.endBending).toBeNull();
    expect(all['lower-terminal'].inputs?.endBending).toBeNull();
    // Not described: 0.25 degree = 0.0043633 rad.
    expect(all['upper-terminal'].inputs?.endBending?.fixedMisalignmentRad).toBeCloseTo(0.0043633, 7);
    const seized = details({ upperArticulation: 'seized' })['upper-terminal'];
    expect(seized.inputs?.endBending?.fixedMisalignmentRad).toBeCloseTo(0.0174533, 7);
  });

  it('sets the factor by what can be seen and what it costs to lose it', () => {
    const all = details();
    expect(all['free-length'].designFatigueFactor).toBe(5);
    expect(all['upper-terminal'].designFatigueFactor).toBe(10);
    expect(all.chainplate.designFatigueFactor).toBe(10);
    expect(details({ lossDropsMast: false })['upper-terminal'].designFatigueFactor).toBe(5);
    const inspected = details({ inspectionInDate: true });
    expect(inspected['free-length'].designFatigueFactor).toBe(3);
    expect(inspected['upper-terminal'].designFatigueFactor).toBe(10);
  });

  it('weakens a thread above 30 mm (hand: (36 / 30)^0.25)', () => {
    const thread = { designation: 'M36', diameterMm: 36, tensileStressAreaMm2: 817 };
    expect(details({ thread })['turnbuckle-thread'].inputs?.sizeFactor).toBeCloseTo(1.04664, 5);
    expect(details()['turnbuckle-thread'].inputs?.sizeFactor).toBe(1);
  });
});

describe('what is not known is not assessed', () => {
  it.each([
    ['turnbuckle-thread', { thread: null }, 'The thread size is not known.'],
    ['pin', { pinDiameterMm: null }, 'The pin diameter is not known.'],
    ['chainplate', {}, 'The chainplate was not described.'],
    ['upper-terminal', { upperTerminal: 'unknown' }, 'The kind of terminal is not known.'],
    [
      'lower-terminal',
      { lowerTerminal: 'ferrule-eye' },
      'No usable fatigue curve exists for this kind of terminal.',
    ],
    [
      'lower-terminal',
      { lowerTerminal: 'cold-head' },
      'A cold-formed head belongs on rod; say how this end is made.',
    ],
  ] as const)('%s with %j', (key, overrides, reason) => {
    expect(details(overrides)[key]).toMatchObject({
      curveId: null,
      curveVersion: null,
      inputs: null,
      notAssessedReason: reason,
    });
  });

  it('refuses an area or diameter of zero', () => {
    expect(() => details({ metallicAreaMm2: 0 })).toThrow(RangeError);
    expect(() => details({ pinDiameterMm: -1 })).toThrow(RangeError);
    expect(() => details({ youngMpa: NaN })).toThrow(RangeError);
  });
});

describe('other constructions', () => {
  it.each([
    ['1x19-compacted', 'en-1993-1-11-150'],
    ['7x19', 'dnv-os-e301-stranded-rope'],
    ['7x7', 'dnv-os-e301-stranded-rope'],
    ['6x7-fibre-core', 'dnv-os-e301-stranded-rope'],
    ['rod', 'en-1993-1-9-160'],
  ] as const)('%s is assessed on %s in its free length', (construction, curveId) => {
    expect(details({ construction })['free-length'].curveId).toBe(curveId);
  });

  it('rod: cold-formed heads on the low end of their estimate', () => {
    const all = details({ construction: 'rod', upperTerminal: 'cold-head', lowerTerminal: 'swaged' });
    expect(all['upper-terminal'].curveId).toBe('estimate-rod-head-50');
    expect(all['lower-terminal'].notAssessedReason).toContain('Only cold-formed heads');
  });

  it('fibre has no details: it is kept by its calendar', () => {
    expect(defaultDetails({ ...part, construction: 'fibre' })).toEqual([]);
  });

  it('takes a chainplate as a surveyor described it', () => {
    const chainplate = {
      curveId: 'dnv-rp-c203-2016-c-air',
      curveVersion: 1,
      areaMm2: 500,
      stressConcentration: 2.4,
      sizeFactor: 1,
    };
    expect(details({ chainplate }).chainplate).toMatchObject({
      curveId: 'dnv-rp-c203-2016-c-air',
      inputs: { factor: 2, stressConcentration: 2.4, lifeDivisor: 3 },
    });
  });
});

describe('model of a detail', () => {
  const curve: ReferenceCurve = {
    id: 'en-1993-1-11-150',
    version: 1,
    name: 'test',
    appliesTo: 'test',
    measure: 'stress-metallic',
    level: 'fractile-95-75',
    k: 1.645,
    sdLog10N: null,
    environment: 'corrosion-protected',
    segments: [{ above: 0, m: 4, log10a: 15 }],
    meanLoad: { kind: 'none', reason: 'the mean is in the tests.' },
    thickness: null,
    threadSize: null,
    cutOffRange: null,
    validity: { minRange: null, maxRange: null, note: '' },
    source: 'test',
    provenance: 'derived',
    provenanceNote: 'test',
    analogyNote: 'test',
    selectable: true,
  };

  it('is the inputs with their curve', () => {
    const detail = details()['free-length'];
    expect(detailModelOf(detail, curve)).toEqual({ ...detail.inputs, curve });
    expect(detailModelOf(details().chainplate, curve)).toBeNull();
  });

  it('refuses another curve or version than the account was kept on', () => {
    expect(() => detailModelOf(details()['upper-terminal'], curve)).toThrow(/estimate-strand-terminal-112/);
    expect(() => detailModelOf(details()['free-length'], { ...curve, version: 2 })).toThrow(/version 2/);
  });

  it('refuses a mean rule its curve does not take', () => {
    const detail = details()['free-length'];
    if (detail.inputs === null) throw new Error('The free length is assessed.');
    const inputs = { ...detail.inputs, mean: { kind: 'goodman', ultimate: 1500 } as const };
    expect(() => detailModelOf({ ...detail, inputs }, curve)).toThrow(MeanRuleRefusedError);
  });
});
