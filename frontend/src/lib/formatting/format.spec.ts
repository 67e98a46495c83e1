import { preferencesSchema, type Preferences } from '@stayledger/shared/contracts/auth';
import { describe, expect, it } from 'vitest';
import { createFormatter, parseNumber } from './format';

const formatter = (preferences: Partial<Preferences> = {}) =>
  createFormatter(preferencesSchema.parse(preferences));
const nbsp = '\u00a0';
const narrow = '\u202f';

describe('figures', () => {
  it('groups from five digits and writes a true minus', () => {
    const format = formatter();
    expect(format.number(1234.5, 1)).toBe('1234.5');
    expect(format.number(-12345.678, 2)).toBe(`\u221212${narrow}345.68`);
    expect(format.number(1_234_567)).toBe(`1${narrow}234${narrow}567`);
  });

  it('never writes a minus before a rounded nothing', () => {
    expect(formatter().number(-0.004, 2)).toBe('0.00');
  });

  it('shows a dash for what is not known and never "NaN"', () => {
    const format = formatter();
    for (const unknown of [null, undefined, Number.NaN]) expect(format.number(unknown)).toBe('–');
    expect(format.force(null)).toBe('–');
  });

  it('keeps so many significant figures', () => {
    const format = formatter();
    expect(format.significant(0.00123456, 3)).toBe('0.00123');
    expect(format.significant(98765, 2)).toBe(`99${narrow}000`);
    expect(format.significant(0)).toBe('0');
  });

  it('writes very small amounts with a power of ten', () => {
    expect(formatter().scientific(3.2e-6)).toBe(`3.2${narrow}×${narrow}10⁻⁶`);
    expect(formatter({ decimalComma: true }).scientific(3.2e-6)).toBe(`3,2${narrow}×${narrow}10⁻⁶`);
    expect(formatter().powerOfTen(1e6)).toBe('10⁶');
  });
});

describe('units', () => {
  // 1 kgf = 9.80665 N (standard gravity); 1 lbf = 4.4482216152605 N (international pound). 10 kN by hand:
  // 10000 / 9.80665 = 1019.716; 10000 / 4.4482216152605 = 2248.089; 10 / 9.80665 = 1.0197; 10 kN = 1000 daN.
  it.each([
    ['kN', '10.0'],
    ['kgf', '1020'],
    ['lbf', '2248'],
    ['daN', '1000'],
    ['tf', '1.02'],
  ] as const)('shows 10 kN in %s as %s', (forceUnit, figure) => {
    expect(formatter({ forceUnit }).force(10)).toBe(`${figure}${nbsp}${forceUnit}`);
  });

  it('reads back what it shows', () => {
    const format = formatter({ forceUnit: 'lbf', lengthUnit: 'ft' });
    expect(format.forceToKn(format.forceFromKn(62.1))).toBeCloseTo(62.1, 12);
    expect(format.lengthToM(format.lengthFromM(14.2))).toBeCloseTo(14.2, 12);
    // One international foot is 0.3048 m: 14.2 m / 0.3048 = 46.588 ft.
    expect(format.length(14.2)).toBe(`46.6${nbsp}ft`);
  });

  it('says allowances as a share, and beyond the whole as a multiple', () => {
    const format = formatter();
    expect(format.allowance(0.67)).toBe(`67${nbsp}%`);
    expect(format.allowance(0.031)).toBe(`3.1${nbsp}%`);
    expect(format.allowance(0.00004)).toBe(`under 0.1${nbsp}%`);
    expect(format.allowance(1.4)).toBe('1.4 times its allowance');
    expect(format.allowance(1)).toBe(`100${nbsp}%`);
  });

  it('keeps the decimals a diameter has', () => {
    expect(formatter().diameter(10)).toBe(`10${nbsp}mm`);
    expect(formatter({ decimalComma: true }).diameter(7.94)).toBe(`7,94${nbsp}mm`);
  });
});

describe('days and instants', () => {
  it('names days within twelve months and seasons beyond', () => {
    const format = formatter();
    expect(format.dueDay('2027-11-30', '2026-12-01')).toBe(`30${nbsp}Nov${nbsp}2027`);
    expect(format.dueDay('2026-05-03', '2026-12-01')).toBe(`3${nbsp}May${nbsp}2026`);
    expect(format.dueDay('2028-04-02', '2026-12-01')).toBe(`spring${nbsp}2028`);
    expect(format.dueDay('2028-08-02', '2026-12-01')).toBe(`summer${nbsp}2028`);
  });

  it('names a winter by both of its years, from December and from January alike', () => {
    const format = formatter();
    expect(format.dueDay('2028-12-02', '2026-12-01')).toBe(`winter${nbsp}2028/29`);
    expect(format.dueDay('2029-01-15', '2026-12-01')).toBe(`winter${nbsp}2028/29`);
  });

  it('turns the seasons round in southern zones', () => {
    const format = formatter();
    expect(format.dueDay('2028-04-02', '2026-12-01', 'Australia/Hobart')).toBe(`autumn${nbsp}2028`);
    expect(format.dueDay('2029-01-15', '2026-12-01', 'Pacific/Auckland')).toBe(`summer${nbsp}2028/29`);
  });

  it('does not move a day by any zone: specs run in Pacific/Chatham', () => {
    expect(formatter().day('2027-03-14')).toBe(`14${nbsp}Mar${nbsp}2027`);
  });

  it('shows an instant in the zone asked for', () => {
    // Oslo keeps UTC+2 in July: 22:30 UTC on the 1st is half past midnight on the 2nd.
    expect(formatter().instant('2026-07-01T22:30:00.000Z', 'Europe/Oslo')).toBe(
      `2${nbsp}Jul${nbsp}2026, 00:30`,
    );
  });
});

describe('parseNumber', () => {
  it.each([
    ['12.5', 12.5],
    ['12,5', 12.5],
    [' 1 234,5 ', 1234.5],
    ['1,234.5', 1234.5],
    ['1.234,5', 1234.5],
    ['-0,5', -0.5],
    ['.5', 0.5],
    ['7', 7],
  ])('reads "%s" as %f', (text, value) => {
    expect(parseNumber(text)).toBe(value);
  });

  it.each(['', 'abc', '1.2.3', '12,34,5', '1,23.4', '5 kN', '1e3', '--2', '.'])('refuses "%s"', (text) => {
    expect(parseNumber(text)).toBeNull();
  });
});
