import { describe, expect, it } from 'vitest';
import { chooseDetail, type ChosenInputs } from './choose-detail.js';
import { defaultDetails } from './default-details.js';
import type { PartDetail } from './part-detail.js';

const DETAILS = defaultDetails({
  construction: '1x19',
  metallicAreaMm2: 40,
  youngMpa: 107_000,
  upperTerminal: 'swaged',
  lowerTerminal: 'unknown',
  thread: { designation: 'M36', diameterMm: 36, tensileStressAreaMm2: 816.7 },
  pinDiameterMm: 12,
  chainplate: null,
  lossDropsMast: true,
});
const detail = (kind: PartDetail['kind']): PartDetail => {
  const found = DETAILS.find((one) => one.kind === kind);
  if (!found) throw new Error(`no ${kind}`);
  return found;
};

type ChosenCurve = NonNullable<ChosenInputs['curve']>;
const curve = (override: Partial<ChosenCurve> = {}): ChosenCurve => ({
  id: 'own-curve',
  version: 2,
  name: 'Own tests of 1x19',
  measure: 'stress-metallic',
  environment: 'air',
  threadSize: null,
  selectable: true,
  ...override,
});

describe('choosing the inputs of a detail', () => {
  it('leaves a detail as it is where nothing was decided', () => {
    const wire = detail('free-length');
    expect(chooseDetail(wire, { curve: null, designFatigueFactor: null }, 'stress-metallic')).toEqual(wire);
  });

  it('puts the chosen curve in place and drops the doubt about the borrowed one', () => {
    const terminal = detail('upper-terminal');
    const chosen = chooseDetail(terminal, { curve: curve(), designFatigueFactor: null }, 'stress-metallic');
    expect(chosen).toMatchObject({ curveId: 'own-curve', curveVersion: 2 });
    // Area, bending and surroundings are those of the default.
    expect(chosen.inputs).toEqual(terminal.inputs);
    expect(chosen.estimates).toEqual(terminal.estimates.slice(1));
    expect(chosen.estimates).toHaveLength(1);
    expect(chosen.explanation).toContain('Assessed on Own tests of 1x19, as chosen. The default: Swaged');
  });

  it('charges sea water once', () => {
    const wire = detail('free-length');
    expect(wire.inputs?.lifeDivisor).toBe(2);
    const chosen = chooseDetail(
      wire,
      { curve: curve({ environment: 'seawater-free-corrosion' }), designFatigueFactor: null },
      'stress-metallic',
    );
    expect(chosen.inputs?.lifeDivisor).toBe(1);
    expect(chosen.explanation).toContain('life is not divided for it again');
  });

  it('takes the size rule of the chosen curve for a thread', () => {
    const thread = detail('turnbuckle-thread');
    const onThread = (threadSize: ChosenCurve['threadSize']) =>
      chooseDetail(
        thread,
        { curve: curve({ measure: 'stress-thread', threadSize }), designFatigueFactor: null },
        'stress-thread',
        36,
      ).inputs?.sizeFactor;
    // EN 1993-1-9, detail 14: ks = (30/36)^0.25 = 0.9554 by hand, so the range is raised by 1 / 0.9554 = 1.0466.
    expect(thread.inputs?.sizeFactor).toBeCloseTo(onThread({ exponent: 0.25, referenceMm: 30 }) ?? NaN, 12);
    expect(onThread({ exponent: 0.25, referenceMm: 30 })).toBeCloseTo(1.0466, 4);
    expect(onThread(null)).toBe(1);
  });

  it('does not use a curve of another measure or one for comparison only, and says so', () => {
    const wire = detail('free-length');
    for (const wrong of [curve({ measure: 'load-ratio' }), curve({ selectable: false })]) {
      const kept = chooseDetail(wire, { curve: wrong, designFatigueFactor: null }, 'stress-metallic');
      expect(kept.curveId).toBe(wire.curveId);
      expect(kept.inputs).toEqual(wire.inputs);
      expect(kept.estimates.at(-1)).toContain('does not fit this detail any more');
    }
  });

  it('changes the factor alone, also of what is not assessed', () => {
    const terminal = detail('upper-terminal');
    const chosen = chooseDetail(terminal, { curve: null, designFatigueFactor: 3 }, 'stress-metallic');
    expect(chosen).toMatchObject({ designFatigueFactor: 3, curveId: terminal.curveId });
    expect(chosen.explanation).toContain('Design fatigue factor 3, as chosen instead of 10.');
    const unknown = detail('lower-terminal');
    expect(unknown.inputs).toBeNull();
    const still = chooseDetail(unknown, { curve: curve(), designFatigueFactor: 5 }, null);
    expect(still).toMatchObject({ curveId: null, inputs: null, designFatigueFactor: 5 });
  });
});
