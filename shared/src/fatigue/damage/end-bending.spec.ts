import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { endBendingStressMpa } from './end-bending.js';
import { endBendingRangeMpa } from './end-bending-range.js';

const DEGREE = Math.PI / 180;

describe('bending at a fixed end', () => {
  it('BE-01: 0.01 rad, 130 GPa, 300 MPa (derived: 0.02 * sqrt(3.9e7) = 124.89996)', () => {
    expect(endBendingStressMpa(0.01, 130_000, 300)).toBeCloseTo(124.89996, 5);
  });

  it('BE-02: 1 degree, rod of 193 GPa, 400 MPa (derived)', () => {
    expect(endBendingStressMpa(DEGREE, 193_000, 400)).toBeCloseTo(306.70158, 5);
  });

  it.each([
    [0.5, 130_000, 200, 88.99],
    [1, 130_000, 300, 217.99],
    [2, 130_000, 300, 435.98],
  ])('%s degrees, %s MPa, at %s MPa (table of section 7.1, derived)', (degrees, young, stress, expected) => {
    expect(endBendingStressMpa(degrees * DEGREE, young, stress)).toBeCloseTo(expected, 2);
  });

  it('does not bend a slack stay and does not care for the sign of the angle', () => {
    expect(endBendingStressMpa(0.01, 130_000, 0)).toBe(0);
    expect(endBendingStressMpa(0.01, 130_000, -5)).toBe(0);
    expect(endBendingStressMpa(-0.01, 130_000, 300)).toBe(endBendingStressMpa(0.01, 130_000, 300));
  });
});

describe('range of that bending', () => {
  it('is the difference of the two stresses for a standing misalignment (hand)', () => {
    // 2 * sqrt(130000) * 0.01 * (sqrt(400) - sqrt(100)) = 2 * 360.5551 * 0.01 * 10 = 72.11103
    const bending = { fixedMisalignmentRad: 0.01, swingRad: 0, youngMpa: 130_000 };
    expect(endBendingRangeMpa(100, 400, bending)).toBeCloseTo(72.11103, 5);
  });

  it('adds the swing at the high load (hand)', () => {
    // 2 * 360.5551 * |0.015 * 20 - 0.01 * 10| = 721.1103 * 0.2 = 144.22205
    const bending = { fixedMisalignmentRad: 0.01, swingRad: 0.005, youngMpa: 130_000 };
    expect(endBendingRangeMpa(100, 400, bending)).toBeCloseTo(144.22205, 5);
  });

  it('is a range even where the swing turns the end back (hand)', () => {
    // 721.1103 * |0 * 20 - 0.01 * 10| = 72.11103
    const bending = { fixedMisalignmentRad: 0.01, swingRad: -0.01, youngMpa: 130_000 };
    expect(endBendingRangeMpa(100, 400, bending)).toBeCloseTo(72.11103, 5);
  });

  it('is the whole bending stress from slack, and grows with the misalignment', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 0.05, noNaN: true }),
        fc.double({ min: 0, max: 800, noNaN: true }),
        (angle, high) => {
          const bending = { fixedMisalignmentRad: angle, swingRad: 0, youngMpa: 130_000 };
          expect(endBendingRangeMpa(-3, high, bending)).toBeCloseTo(
            endBendingStressMpa(angle, 130_000, high),
            8,
          );
          const more = { ...bending, fixedMisalignmentRad: angle * 2 };
          expect(endBendingRangeMpa(0, high, more)).toBeGreaterThanOrEqual(
            endBendingRangeMpa(0, high, bending),
          );
        },
      ),
    );
  });
});
