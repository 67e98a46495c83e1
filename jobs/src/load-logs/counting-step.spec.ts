import { damageOfSpectrum } from '@stayledger/shared/fatigue/damage/damage-of-spectrum';
import { spectrumOf } from '@stayledger/shared/fatigue/rainflow/spectrum-of';
import { SeededRandom } from '../demo/seeded-random.js';
import { countingStepKn, roundingShare } from './counting-step.js';

describe('countingStepKn', () => {
  it.each([
    [[40], 0.01],
    [[39.9], 0.005],
    [[120, 35], 0.005],
    [[4], 0.001],
    [[1000], 0.2],
    [[], 0.005],
  ])('breaking loads of %j kN: steps of %d kN', (breakingLoads, step) => {
    expect(countingStepKn(breakingLoads)).toBe(step);
  });

  it('is never coarser than 1/2000 of the lowest breaking load', () => {
    const random = new SeededRandom('steps');
    for (let i = 0; i < 500; i++) {
      const breakingLoad = 10 ** random.between(0, 4);
      const step = countingStepKn([breakingLoad, 2 * breakingLoad]);
      expect(step).toBeLessThanOrEqual(breakingLoad / 2000);
      expect(step).toBeGreaterThanOrEqual(breakingLoad / 20_000);
    }
  });
});

describe('roundingShare', () => {
  // Expected: the same loads counted exactly and on the grid, each by the engine; slope 5.
  it('tells the size of the change that rounding makes', () => {
    const random = new SeededRandom('rounding');
    const loads = Array.from({ length: 40_000 }, () => 10 + 3 * random.normal());
    const model = {
      factor: 1,
      stressConcentration: 1,
      sizeFactor: 1,
      lifeDivisor: 1,
      cutOff: 'as-curve' as const,
      curve: { segments: [{ above: 0, m: 5, log10a: 12 }] },
      mean: { kind: 'none' as const },
      endBending: null,
    };
    const exact = damageOfSpectrum(spectrumOf(loads), model).damage;
    const coarse = spectrumOf(loads, { step: 1 });
    const measured = damageOfSpectrum(coarse, model).damage / exact - 1;
    expect(measured).toBeGreaterThan(0.01);
    expect(roundingShare(coarse, 5) / measured).toBeGreaterThan(0.7);
    expect(roundingShare(coarse, 5) / measured).toBeLessThan(1.4);
    // On the grid of a 40 kN wire the change is far below the stated 0.1 %.
    const fine = spectrumOf(loads, { step: 0.01 });
    expect(Math.abs(damageOfSpectrum(fine, model).damage / exact - 1)).toBeLessThan(1e-4);
    expect(roundingShare(fine, 5)).toBeLessThan(1e-4);
  });
});
