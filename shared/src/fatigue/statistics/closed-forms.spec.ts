import { describe, expect, it } from 'vitest';
import type { Curve } from '../curves/curve.js';
import { cyclesToFailure } from '../curves/cycles-to-failure.js';
import { elementary } from '../curves/elementary.js';
import { kneeRange } from '../curves/knee-range.js';
import { classRuleDamage } from './class-rule-damage.js';
import { rayleighDamage } from './rayleigh-damage.js';
import { weibullDamage, weibullScale } from './weibull-damage.js';

function expectRelative(actual: number, expected: number, tolerance = 1e-6): void {
  expect(Math.abs(actual / expected - 1)).toBeLessThan(tolerance);
}

/** DNV-RP-C203 (2016) class D in air (secondary transcription). */
const UPPER = { m: 3, log10a: 12.164 };
const LOWER = { m: 5, log10a: 15.606 };
const CLASS_D_AIR: Curve = {
  segments: [
    { above: kneeRange(UPPER, LOWER), ...UPPER },
    { above: 0, ...LOWER },
  ],
};

/** The same integral by the trapezium rule in the exceedance probability, sharing nothing with the closed form. */
function damageByIntegration(cycles: number, scale: number, shape: number, curve: Curve): number {
  const steps = 400_000;
  let sum = 0;
  for (let i = 0; i < steps; i++) {
    const t = 60 * ((i + 0.5) / steps) ** 2;
    const width = (120 * ((i + 0.5) / steps)) / steps;
    sum += (Math.exp(-t) * width) / cyclesToFailure(curve, scale * t ** (1 / shape));
  }
  return cycles * sum;
}

describe('Rayleigh ranges', () => {
  it('MD-05: standard deviation 20 MPa, 1e7 cycles, class D air (derived, section 4.5)', () => {
    expectRelative(rayleighDamage(1e7, 20, elementary(CLASS_D_AIR)), 1.6495336);
    expectRelative(rayleighDamage(1e7, 20, CLASS_D_AIR), 1.5875091);
  });

  it('agrees with numerical integration', () => {
    expectRelative(
      rayleighDamage(1e7, 20, CLASS_D_AIR),
      damageByIntegration(1e7, 2 * Math.SQRT2 * 20, 2, CLASS_D_AIR),
      1e-5,
    );
  });
});

describe('Weibull ranges', () => {
  it('MD-06: 1e8 cycles, largest 150 MPa, shape 1 (derived)', () => {
    const scale = weibullScale(150, 1e8, 1);
    expectRelative(scale, 8.1430215);
    expectRelative(weibullDamage({ cycles: 1e8, scale, shape: 1 }, elementary(CLASS_D_AIR)), 0.2220793);
    expectRelative(weibullDamage({ cycles: 1e8, scale, shape: 1 }, CLASS_D_AIR), 0.0919956);
  });

  it('MD-07: shapes 0.8 and 1.1 (derived)', () => {
    const first = { cycles: 1e8, scale: weibullScale(150, 1e8, 0.8), shape: 0.8 };
    expectRelative(weibullDamage(first, CLASS_D_AIR), 0.02320174);
    const second = { cycles: 1e7, scale: weibullScale(120, 1e7, 1.1), shape: 1.1 };
    expectRelative(weibullDamage(second, CLASS_D_AIR), 0.01021493);
  });

  it('agrees with numerical integration on a curve of three stretches with a cut-off', () => {
    // EN 1993-1-9 category 71, constants of clause 7.1.
    const curve: Curve = {
      segments: [
        { above: 52.3132, m: 3, log10a: 11.854806 },
        { above: 28.7346, m: 5, log10a: 15.29199 },
      ],
    };
    const ranges = { cycles: 1e7, scale: 12, shape: 0.9 };
    expectRelative(weibullDamage(ranges, curve), damageByIntegration(1e7, 12, 0.9, curve), 1e-4);
  });

  it('refuses a scale or shape of zero', () => {
    expect(() => weibullDamage({ cycles: 1, scale: 0, shape: 1 }, CLASS_D_AIR)).toThrow(RangeError);
    expect(() => weibullDamage({ cycles: 1, scale: 1, shape: 0 }, CLASS_D_AIR)).toThrow(RangeError);
  });
});

describe('class-rule form', () => {
  const input = {
    cycles: 1e7,
    intercept: 1.519e12,
    m: 3,
    slopeChange: 2,
    shape: 1,
    referenceRangeMpa: 60,
    exceededOnceIn: 100,
    kneeRangeMpa: 53.4,
  };

  it('MD-08: nu, mu and damage (class-society common structural rules, secondary)', () => {
    const { nu, mu, damage } = classRuleDamage(input);
    expectRelative(nu, 4.0986015);
    expectRelative(mu, 0.6888337);
    expectRelative(damage, 0.06017617);
  });

  it('is the two-segment closed form written another way', () => {
    const log10a = Math.log10(1.519e12);
    const curve: Curve = {
      segments: [
        { above: 53.4, m: 3, log10a },
        { above: 0, m: 5, log10a: log10a + 2 * Math.log10(53.4) },
      ],
    };
    const scale = weibullScale(60, 100, 1);
    expectRelative(
      weibullDamage({ cycles: 1e7, scale, shape: 1 }, curve),
      classRuleDamage(input).damage,
      1e-10,
    );
  });
});
