import { describe, expect, it } from 'vitest';
import type { Curve } from '../curves/curve.js';
import { damageOfSpectrum } from '../damage/damage-of-spectrum.js';
import type { DetailModel } from '../damage/detail-model.js';
import { mapAffine } from '../rainflow/map-affine.js';
import { mergeAll } from '../rainflow/merge-spectra.js';
import { spectrumOf } from '../rainflow/spectrum-of.js';
import { normalSource } from '../statistics/normal-source.js';
import { rayleighDamage } from '../statistics/rayleigh-damage.js';
import { seededRandom } from '../statistics/seeded-random.js';
import { weibullDamage } from '../statistics/weibull-damage.js';

/** DNV-RP-C203 (2016) class D in air, its two slopes meeting where their constants say (secondary transcription). */
const KNEE = 10 ** ((15.606 - 12.164) / 2);
const CLASS_D: Curve = {
  segments: [
    { above: KNEE, m: 3, log10a: 12.164 },
    { above: 0, m: 5, log10a: 15.606 },
  ],
};

function detailOf(areaMm2: number, curve: Curve): DetailModel {
  return {
    factor: 1000 / areaMm2,
    stressConcentration: 1,
    sizeFactor: 1,
    lifeDivisor: 1,
    cutOff: 'as-curve',
    mean: { kind: 'none' },
    endBending: null,
    curve,
  };
}

const DETAIL = detailOf(100, CLASS_D);
const STEP_KN = 0.01;

describe('closed forms against simulated histories, counted, merged and summed', () => {
  it('Rayleigh: a slowly swelling sine of standard deviation 2 kN (closed form of DNV-RP-C203, from memory)', () => {
    // Narrow-band Gaussian load: two slow Gaussian envelopes on cosine and sine, 16 samples a cycle, in ten logs.
    const normal = normalSource(seededRandom(11));
    const cycles = 60_000;
    const perCycle = 16;
    const stays = 1 - 1 / (60 * perCycle);
    const kick = Math.sqrt(1 - stays * stays);
    let cosine = normal();
    let sine = normal();
    const loads = Float64Array.from({ length: cycles * perCycle }, (_, i) => {
      cosine = stays * cosine + kick * normal();
      sine = stays * sine + kick * normal();
      const phase = (2 * Math.PI * i) / perCycle;
      return 20 + 2 * (cosine * Math.cos(phase) + sine * Math.sin(phase));
    });
    const length = loads.length / 10;
    const logs = Array.from({ length: 10 }, (_, log) =>
      spectrumOf(loads.subarray(log * length, (log + 1) * length), { step: STEP_KN, day: log }),
    );
    const counted = damageOfSpectrum(mergeAll(logs), DETAIL).damage;
    // 2 kN on 100 mm2 are 20 MPa. The squared envelope forgets itself over 30 cycles, so 60,000 cycles hold some 1,000
    // independent ones; damage of one has a cov of sqrt(Gamma(4) / Gamma(2.5)^2 - 1) = 1.55 at m = 3: standard error
    // 5 %, three of them. Sixteen samples a cycle lose 2 % (sampled sine, ratio 1/16, m = 3).
    const closed = rayleighDamage(cycles, 20, CLASS_D);
    expect(Math.abs(counted / closed - 1)).toBeLessThan(0.15);
  });

  it.each([0.8, 1, 1.5])('Weibull: independent ranges of shape %s', (shape) => {
    const random = seededRandom(17);
    const cycles = 200_000;
    const scaleKn = 1.2;
    // Every cycle rises from the same floor and falls back to it, so each range is counted as it was drawn.
    const loads = new Float64Array(2 * cycles + 1);
    for (let i = 0; i < cycles; i++) loads[2 * i + 1] = scaleKn * (-Math.log(1 - random())) ** (1 / shape);
    const counted = damageOfSpectrum(spectrumOf(loads, { step: 0 }), DETAIL).damage;
    const closed = weibullDamage({ cycles, scale: scaleKn * 10, shape }, CLASS_D);
    // The mean square of the damage of one range is the closed form on the curve of doubled slopes; four standard errors.
    const squared: Curve = {
      segments: CLASS_D.segments.map(({ above, m, log10a }) => ({ above, m: 2 * m, log10a: 2 * log10a })),
    };
    const square = weibullDamage({ cycles: 1, scale: scaleKn * 10, shape }, squared);
    const error = Math.sqrt((square - (closed / cycles) ** 2) * cycles);
    expect(error / closed).toBeLessThan(0.04);
    expect(Math.abs(counted - closed)).toBeLessThan(4 * error);
  });

  it('gives lives of two sizes in the ratio of their areas to the power m, under one power law', () => {
    const normal = normalSource(seededRandom(23));
    const loads = Float64Array.from({ length: 20_000 }, () => 15 + 4 * normal());
    const spectrum = spectrumOf(loads, { step: STEP_KN });
    for (const m of [3, 4.8, 5.05]) {
      const curve: Curve = { segments: [{ above: 0, m, log10a: 12 }] };
      const ratio =
        damageOfSpectrum(spectrum, detailOf(38.2, curve)).damage /
        damageOfSpectrum(spectrum, detailOf(59.69, curve)).damage;
      expect(Math.abs(ratio / (59.69 / 38.2) ** m - 1)).toBeLessThan(1e-9);
    }
  });

  it('multiplies damage by gain to the power m (published examples: +5 % at m = 5 is 1.276, at m = 3 1.158)', () => {
    const normal = normalSource(seededRandom(29));
    const spectrum = spectrumOf(Float64Array.from({ length: 20_000 }, () => 15 + 4 * normal()));
    for (const [m, expected] of [
      [5, 1.276],
      [3, 1.158],
    ]) {
      const detail = detailOf(50, { segments: [{ above: 0, m, log10a: 12 }] });
      const gained = damageOfSpectrum(mapAffine(spectrum, { gain: 1.05, zero: 0 }), detail).damage;
      expect(gained / damageOfSpectrum(spectrum, detail).damage).toBeCloseTo(expected, 3);
    }
  });
});
