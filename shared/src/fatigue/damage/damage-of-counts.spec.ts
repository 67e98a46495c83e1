import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Curve } from '../curves/curve.js';
import { cyclesToFailure } from '../curves/cycles-to-failure.js';
import { elementary } from '../curves/elementary.js';
import { kneeRange } from '../curves/knee-range.js';
import { CompensatedSum } from './compensated-sum.js';
import { damageOfCounts, type LoadCount } from './damage-of-counts.js';
import { equivalentRange } from './equivalent-range.js';
import { MeanAboveUltimateError } from './mean-above-ultimate-error.js';

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

const counted = (pairs: [range: number, count: number][]): LoadCount[] =>
  pairs.map(([range, count]) => ({ range, mean: 0, count }));

describe("Miner's sum of published examples", () => {
  it('MD-01: Shigley 9th edition p. 322, amplitude 60 ksi (published: 8520 cycles, unrounded 8522.01)', () => {
    // S = 129.6 N^-0.085091 turned round: N = (129.6 / S)^(1 / 0.085091). The curve takes amplitudes.
    const m = 1 / 0.085091;
    const curve: Curve = { segments: [{ above: 0, m, log10a: m * Math.log10(129.6) }] };
    expectRelative(cyclesToFailure(curve, 60), 8522.01);
    // 3000 cycles use 0.3520 of the life.
    expectRelative(damageOfCounts(counted([[60, 3000]]), { factor: 1, curve }), 0.352, 1e-3);
  });

  it('MD-02: Budynas and Shigley problem 6-30 (published: 209 160, from printed constants 209 250.4)', () => {
    const m = 1 / 0.11931;
    const curve: Curve = { segments: [{ above: 0, m, log10a: m * Math.log10(155.95) }] };
    const used = damageOfCounts(
      counted([
        [48, 4000],
        [38, 60_000],
      ]),
      { factor: 1, curve },
    );
    const remaining = (1 - used) * cyclesToFailure(curve, 32);
    expectRelative(remaining, 209_250.4, 1e-6);
    expectRelative(remaining, 209_160, 1e-3);
  });

  const blocks: [number, number][] = [
    [120, 2e4],
    [90, 1e5],
    [60, 5e5],
    [40, 2e6],
    [20, 1e7],
  ];

  it('MD-03: five blocks on class D air (derived, section 4.3)', () => {
    expectRelative(damageOfCounts(counted(blocks), { factor: 1, curve: CLASS_D_AIR }), 0.2063606);
  });

  it('MD-04: the same on one slope, and its equivalent range (derived)', () => {
    expectRelative(damageOfCounts(counted(blocks), { factor: 1, curve: elementary(CLASS_D_AIR) }), 0.2902768);
    expectRelative(equivalentRange(counted(blocks), 3), 32.254057);
  });

  it('MD-09: 1e6 cycles of 80 MPa on class D air (derived: 1e6 * 80^3 / 10^12.164)', () => {
    expectRelative(damageOfCounts(counted([[80, 1e6]]), { factor: 1, curve: CLASS_D_AIR }), 0.35097);
  });

  it('the rainflow example of ASTM E1049-85 section 5.4.4 (published counts): sums of range^3 and range^5', () => {
    // RF-05: 1094 and 67838; a curve with a = 1 makes the damage that very sum.
    const counts = counted([
      [3, 0.5],
      [4, 1.5],
      [6, 0.5],
      [8, 1],
      [9, 0.5],
    ]);
    for (const [m, sum] of [
      [3, 1094],
      [5, 67_838],
    ]) {
      expectRelative(
        damageOfCounts(counts, { factor: 1, curve: { segments: [{ above: 0, m, log10a: 0 }] } }),
        sum,
        1e-12,
      );
    }
  });
});

describe('the mean rule of a detail', () => {
  const curve: Curve = { segments: [{ above: 0, m: 4, log10a: 10 }] };
  const mean = { kind: 'goodman', ultimate: 50 } as const;

  it('raises the range by 1 / (1 - factor * mean / ultimate) (hand)', () => {
    // S = 2 * 10 = 20; mean 2 * 12.5 = 25; S_eq = 20 / (1 - 25/50) = 40; D = 3 * 40^4 / 1e10 = 7.68e-4.
    const damage = damageOfCounts([{ range: 10, mean: 12.5, count: 3 }], { factor: 2, curve, mean });
    expectRelative(damage, 7.68e-4, 1e-12);
  });

  it('gives no credit for a negative mean (hand: 20^4 / 1e10)', () => {
    expectRelative(
      damageOfCounts([{ range: 10, mean: -12.5, count: 1 }], { factor: 2, curve, mean }),
      1.6e-5,
      1e-12,
    );
  });

  it('refuses a counted mean at the ultimate, also where the cycle is tiny', () => {
    expect(() => damageOfCounts([{ range: 0.001, mean: 25, count: 1 }], { factor: 2, curve, mean })).toThrow(
      MeanAboveUltimateError,
    );
  });
});

describe("properties of Miner's sum", () => {
  const counts = fc.array(
    fc.record({
      range: fc.double({ min: 0.01, max: 300, noNaN: true }),
      mean: fc.double({ min: -100, max: 100, noNaN: true }),
      count: fc.constantFrom(0.5, 1, 1.5, 2, 17),
    }),
    { maxLength: 60 },
  );

  it('does not depend on the order of the counts, to the last bit', () => {
    fc.assert(
      fc.property(counts, fc.integer(), (list, seed) => {
        const shuffled = [...list];
        let state = seed;
        for (let i = shuffled.length - 1; i > 0; i--) {
          state = (Math.imul(state, 1664525) + 1013904223) | 0;
          const j = (state >>> 0) % (i + 1);
          [shuffled[i], shuffled[j]] = [shuffled[j], shuffled[i]];
        }
        const detail = { factor: 1.7, curve: CLASS_D_AIR };
        expect(damageOfCounts(shuffled, detail)).toBe(damageOfCounts(list, detail));
      }),
    );
  });

  it('does not depend on the order where even a compensated sum would', () => {
    // Terms 1, 2^-53 and four of 2^-107: added in this order the small ones are lost one by one against 2^-53 and the
    // sum rounds down to 1; added from below they tip it to 1 + 2^-52, which is the exact sum rounded.
    const curve: Curve = { segments: [{ above: 0, m: 1, log10a: 0 }] };
    const list = counted([1, 2 ** -53, ...new Array<number>(4).fill(2 ** -107)].map((range) => [range, 1]));
    expect(damageOfCounts(list, { factor: 1, curve })).toBe(1 + 2 ** -52);
    expect(damageOfCounts(list.reverse(), { factor: 1, curve })).toBe(1 + 2 ** -52);
  });

  it('grows by k^m when all loads are scaled by k on one slope', () => {
    fc.assert(
      fc.property(
        counts.filter((list) => list.length > 0),
        fc.double({ min: 0.2, max: 5, noNaN: true }),
        fc.double({ min: 2, max: 6, noNaN: true }),
        (list, k, m) => {
          const curve: Curve = { segments: [{ above: 0, m, log10a: 12 }] };
          const scaled = list.map((count) => ({ ...count, range: count.range * k, mean: count.mean * k }));
          const ratio =
            damageOfCounts(scaled, { factor: 1, curve }) / damageOfCounts(list, { factor: 1, curve });
          expectRelative(ratio, k ** m, 1e-9);
          // A gain in the load and a factor of the detail are the same thing.
          expectRelative(
            damageOfCounts(list, { factor: k, curve }),
            damageOfCounts(scaled, { factor: 1, curve }),
            1e-9,
          );
        },
      ),
    );
  });

  it('never falls when loads grow, on any slope, knee or cut-off', () => {
    const withCutOff: Curve = { segments: [{ above: 60, ...UPPER }] };
    fc.assert(
      fc.property(counts, fc.double({ min: 1, max: 4, noNaN: true }), (list, k) => {
        for (const curve of [CLASS_D_AIR, withCutOff]) {
          const before = damageOfCounts(list, { factor: 1, curve });
          expect(damageOfCounts(list, { factor: k, curve })).toBeGreaterThanOrEqual(before * (1 - 1e-12));
        }
      }),
    );
  });

  it('is zero for nothing, for ranges of zero, and below a cut-off', () => {
    const curve: Curve = { segments: [{ above: 60, ...UPPER }] };
    expect(damageOfCounts([], { factor: 1, curve })).toBe(0);
    expect(damageOfCounts(counted([[0, 5]]), { factor: 1, curve })).toBe(0);
    expect(damageOfCounts(counted([[59.999, 1e9]]), { factor: 1, curve })).toBe(0);
    expect(damageOfCounts(counted([[60, 1]]), { factor: 1, curve })).toBeGreaterThan(0);
  });
});

describe('equivalent range', () => {
  it('is the range itself for one range, and 0 for none', () => {
    expectRelative(equivalentRange(counted([[80, 12]]), 5), 80, 1e-12);
    expect(equivalentRange([], 3)).toBe(0);
    expect(() => equivalentRange([], 0)).toThrow(RangeError);
  });
});

describe('compensated sum', () => {
  it('keeps what plain addition loses (hand: 1 + 1e100 + 1 - 1e100 = 2)', () => {
    const sum = new CompensatedSum();
    for (const value of [1, 1e100, 1, -1e100]) sum.add(value);
    expect(sum.value).toBe(2);
  });

  it('becomes infinite, not NaN, with an infinite term', () => {
    const sum = new CompensatedSum();
    sum.add(1);
    sum.add(Infinity);
    expect(sum.value).toBe(Infinity);
  });
});
