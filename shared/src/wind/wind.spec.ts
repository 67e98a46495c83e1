import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { apparentWind, trueWind } from './apparent-wind.js';
import { beaufort } from './beaufort.js';
import { encounterFrequencyHz } from './encounter-frequency.js';

const DEGREE = Math.PI / 180;

describe('wind', () => {
  it('WX-01: true 12 at 45 degrees, boat 6 (derived)', () => {
    const wind = apparentWind({ speed: 12, angleRad: 45 * DEGREE }, 6);
    expect(wind.speed).toBeCloseTo(16.787596, 6);
    expect(wind.angleRad / DEGREE).toBeCloseTo(30.361193, 6);
  });

  it('goes there and back, keeping the side', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 60, noNaN: true }),
        fc.double({ min: -3, max: 3, noNaN: true }),
        fc.double({ min: 0, max: 20, noNaN: true }),
        (speed, angleRad, boat) => {
          const back = trueWind(apparentWind({ speed, angleRad }, boat), boat);
          expect(back.speed).toBeCloseTo(speed, 9);
          expect(back.angleRad).toBeCloseTo(angleRad, 9);
        },
      ),
    );
  });

  it.each([
    [0, 0],
    [0.29, 0],
    [0.3, 1],
    [17.15, 7],
    [17.2, 8],
    [32.69, 11],
    [32.7, 12],
    [70, 12],
  ])('WX-02: %s m/s is Beaufort %i (WMO scale, published bounds)', (speed, number) => {
    expect(beaufort(speed)).toBe(number);
  });

  it('refuses a negative wind', () => {
    expect(() => beaufort(-1)).toThrow(RangeError);
    expect(() => beaufort(NaN)).toThrow(RangeError);
  });

  it('LM-07: 0.2 Hz waves met at 6 knots against a head sea (derived; 1 kn = 1852/3600 m/s)', () => {
    expect(encounterFrequencyHz(0.2, (6 * 1852) / 3600, Math.PI)).toBeCloseTo(0.2791059, 7);
    expect(encounterFrequencyHz(0.2, 3, Math.PI / 2)).toBeCloseTo(0.2, 12);
  });
});
