import { describe, expect, it } from 'vitest';
import { largestFirstLoadKn } from './first-loads';

describe('largestFirstLoadKn', () => {
  it('converts by the unit that was chosen', () => {
    // 1 tonne-force is 9.80665 kN by definition of standard gravity.
    expect(largestFirstLoadKn(['0.5', '2', '1'], 'tf', false)).toBeCloseTo(19.6133, 10);
    expect(largestFirstLoadKn(['1500'], 'N', false)).toBe(1.5);
  });

  it('reads decimal commas where the log has them', () => {
    expect(largestFirstLoadKn(['1,5', '2,25'], 'kN', true)).toBe(2.25);
    expect(largestFirstLoadKn(['1,5'], 'kN', false)).toBeNull();
  });

  it('passes over cells that are no numbers', () => {
    expect(largestFirstLoadKn(['', 'NaN', '3'], 'kN', false)).toBe(3);
    expect(largestFirstLoadKn(['', 'n/a'], 'kN', false)).toBeNull();
  });
});
