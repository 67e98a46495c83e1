import { describe, expect, it } from 'vitest';
import { calendarRule } from './calendar-rule.js';
import { designFatigueFactor } from './design-fatigue-factor.js';
import { distanceRuleOn } from './distance-rule.js';

const rule = { name: 'Stainless wire', years: { hard: 7, general: 10, light: 12 } };

describe('calendar rule', () => {
  it('runs from the day of fitting', () => {
    const result = calendarRule({ rule, fittedOn: '2018-05-20', buildYear: 1990 });
    expect(result).toMatchObject({
      dueOn: '2028-05-20',
      runsFromOn: '2018-05-20',
      basis: 'fitted-on',
      years: 10,
    });
    expect(result.words).toBe('Stainless wire: 10 years from the day it was fitted, 2018-05-20.');
  });

  it.each([
    ['hard', '2025-05-20'],
    ['light', '2030-05-20'],
  ] as const)('takes the years of %s use', (usageClass, dueOn) => {
    expect(calendarRule({ rule, usageClass, fittedOn: '2018-05-20', buildYear: null }).dueOn).toBe(dueOn);
  });

  it('runs from the first day of the build year when the day of fitting is not known', () => {
    const result = calendarRule({ rule, fittedOn: null, buildYear: 2012 });
    expect(result).toMatchObject({ dueOn: '2022-01-01', basis: 'build-year' });
    expect(result.words).toContain('The day of fitting is not known');
  });

  it('takes the earlier of build year and oldest document', () => {
    const known = { rule, fittedOn: null, buildYear: 2012 };
    expect(calendarRule({ ...known, oldestDocumentOn: '2015-03-01' }).runsFromOn).toBe('2012-01-01');
    expect(calendarRule({ ...known, oldestDocumentOn: '2010-03-01' })).toMatchObject({
      dueOn: '2020-03-01',
      basis: 'oldest-document',
    });
    expect(calendarRule({ ...known, buildYear: null, oldestDocumentOn: '2010-03-01' }).dueOn).toBe(
      '2020-03-01',
    );
  });

  it('has no date and says what would give one when nothing is known', () => {
    const result = calendarRule({ rule, fittedOn: null, buildYear: null });
    expect(result).toMatchObject({ dueOn: null, runsFromOn: null, basis: 'unknown' });
    expect(result.words).toContain('Either one would give a date.');
  });

  it('counts half years, and a leap day stays at the end of its month', () => {
    const half = { name: 'Rule', years: { hard: 2.5, general: 2.5, light: 2.5 } };
    expect(calendarRule({ rule: half, fittedOn: '2024-02-29', buildYear: null }).dueOn).toBe('2026-08-29');
    expect(calendarRule({ rule, fittedOn: '2024-02-29', buildYear: null }).dueOn).toBe('2034-02-28');
  });

  it('refuses what is not a day or a year', () => {
    expect(() => calendarRule({ rule, fittedOn: '2018-5-20', buildYear: null })).toThrow(RangeError);
    expect(() => calendarRule({ rule, fittedOn: null, buildYear: 12 })).toThrow(RangeError);
    expect(() => calendarRule({ rule, fittedOn: null, oldestDocumentOn: 'x', buildYear: null })).toThrow(
      RangeError,
    );
  });
});

describe('distance rule', () => {
  it('is reached at the planned distance (hand: 3000 of 15 000 nm left at 1500 a year is 2 years)', () => {
    // 2 * 365.25 = 730.5, so 730 days after 2026-01-01.
    expect(distanceRuleOn('2026-01-01', 15_000, 12_000, 1500)).toBe('2028-01-01');
  });

  it('is today once it is reached, and never without a plan', () => {
    expect(distanceRuleOn('2026-01-01', 15_000, 15_000, 0)).toBe('2026-01-01');
    expect(distanceRuleOn('2026-01-01', 15_000, 0, 0)).toBeNull();
    expect(() => distanceRuleOn('2026-01-01', 15_000, -1, 0)).toThrow(RangeError);
  });
});

describe('design fatigue factor', () => {
  const detail = { hidden: true, everOpened: false, inspectionInDate: false, lossDropsMast: true };

  it('is 10 for what is hidden, never opened and drops the mast', () => {
    expect(designFatigueFactor(detail).factor).toBe(10);
  });

  it('is 3 while an inspection able to see it is in date, whatever else', () => {
    expect(designFatigueFactor({ ...detail, inspectionInDate: true }).factor).toBe(3);
  });

  it.each([
    { ...detail, hidden: false },
    { ...detail, everOpened: true },
    { ...detail, lossDropsMast: false },
  ])('is 5 in between', (between) => {
    expect(designFatigueFactor(between).factor).toBe(5);
  });
});
