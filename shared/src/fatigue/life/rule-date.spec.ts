import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dayNumber } from './days.js';
import { ruleDate } from './rule-date.js';

const base = {
  asOfOn: '2026-01-01',
  damage: 0,
  dff: 3,
  designDamagePerSailingHour: 1e-4,
  plannedHoursPerYear: 500,
};

describe('rule date', () => {
  it('is now + (1/DFF - D) / (damage per hour * hours per year) (hand)', () => {
    // (1/3 - 1/12) / (1e-4 * 500) = 0.25 / 0.05 = 5 years = 1826.25 days; 2026-01-01 + 1826 days = 2031-01-01.
    const rule = ruleDate({ ...base, damage: 1 / 12 });
    expect(rule.allowanceUsed).toBeCloseTo(0.25, 12);
    expect(rule.remainingYears).toBeCloseTo(5, 12);
    expect(rule.replaceByOn).toBe('2031-01-01');
    expect(rule.overdue).toBe(false);
  });

  it('is 12.5 years at 0.01 a year with a factor of 8 (worked example of section 4.2, derived)', () => {
    const rule = ruleDate({ ...base, dff: 8, designDamagePerSailingHour: 1e-5, plannedHoursPerYear: 1000 });
    expect(rule.remainingYears).toBeCloseTo(12.5, 10);
  });

  it.each([1 / 3, 0.5, 12])('is today, overdue, with a damage of %s', (damage) => {
    const rule = ruleDate({ ...base, damage });
    expect(rule.remainingYears).toBe(0);
    expect(rule.replaceByOn).toBe('2026-01-01');
    expect(rule.overdue).toBe(true);
    expect(rule.allowanceUsed).toBeCloseTo(damage * 3, 12);
  });

  it('has no date where nothing is used or it lies beyond a hundred years', () => {
    expect(ruleDate({ ...base, plannedHoursPerYear: 0 })).toMatchObject({
      remainingYears: Infinity,
      replaceByOn: null,
    });
    expect(ruleDate({ ...base, designDamagePerSailingHour: 0 }).replaceByOn).toBeNull();
    expect(ruleDate({ ...base, designDamagePerSailingHour: 1e-9 }).replaceByOn).toBeNull();
  });

  it('moves nearer with more damage, more sailing and a larger factor', () => {
    const positive = (max: number): fc.Arbitrary<number> => fc.double({ min: 0, max, noNaN: true });
    fc.assert(
      fc.property(
        positive(0.3),
        positive(1e-3),
        positive(2000),
        positive(0.1),
        (damage, rate, hours, more) => {
          const input = { ...base, damage, designDamagePerSailingHour: rate, plannedHoursPerYear: hours };
          const years = ruleDate(input).remainingYears;
          expect(ruleDate({ ...input, damage: damage + more }).remainingYears).toBeLessThanOrEqual(years);
          expect(ruleDate({ ...input, dff: 5 }).remainingYears).toBeLessThanOrEqual(years);
          expect(ruleDate({ ...input, plannedHoursPerYear: hours * 2 }).remainingYears).toBeLessThanOrEqual(
            years,
          );
        },
      ),
    );
  });

  it('never lies before today', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 2, noNaN: true }), (damage) => {
        const { replaceByOn } = ruleDate({ ...base, damage });
        expect(dayNumber(replaceByOn ?? '')).toBeGreaterThanOrEqual(dayNumber(base.asOfOn));
      }),
    );
  });

  it('refuses figures without sense', () => {
    expect(() => ruleDate({ ...base, dff: 0.5 })).toThrow(RangeError);
    expect(() => ruleDate({ ...base, damage: -1 })).toThrow(RangeError);
    expect(() => ruleDate({ ...base, plannedHoursPerYear: NaN })).toThrow(/plannedHoursPerYear/);
    expect(() => ruleDate({ ...base, asOfOn: '2026-02-30' })).toThrow(RangeError);
  });
});
