import { describe, expect, it } from 'vitest';
import { dayAfterYears, yearsBetween } from './day-after-years.js';
import { replaceBy, type ReplaceByInput } from './replace-by.js';

const NOTHING: ReplaceByInput = {
  asOfOn: '2026-06-01',
  fatigueRuleOn: null,
  fatigueReliabilityOn: null,
  calendarOn: null,
  distanceOn: null,
  limits: [],
  findings: [],
  incidents: [],
  fatigueProvisional: false,
};

const ask = (input: Partial<ReplaceByInput>) => replaceBy({ ...NOTHING, ...input });

describe('replaceBy', () => {
  it('is the earliest of all rules, named, with the others behind it', () => {
    const result = ask({
      fatigueRuleOn: '2033-01-01',
      fatigueReliabilityOn: '2031-01-01',
      calendarOn: '2034-01-01',
      distanceOn: '2032-01-01',
      limits: [{ by: 'policy', name: 'Hull policy, clause 4', dueOn: '2030-01-01' }],
    });
    expect(result).toMatchObject({
      state: 'dated',
      replaceByOn: '2030-01-01',
      governingRule: 'policy',
      due: 'in-date',
    });
    expect(result.words).toContain('Hull policy, clause 4');
    expect(result.rules.map(({ rule }) => rule)).toEqual([
      'policy',
      'fatigue-reliability',
      'distance',
      'fatigue-rule',
      'calendar',
    ]);
  });

  it('never lets a late fatigue date lengthen another rule', () => {
    expect(ask({ fatigueRuleOn: '2090-01-01', calendarOn: '2027-01-01' }).replaceByOn).toBe('2027-01-01');
    expect(ask({ calendarOn: '2027-01-01' }).replaceByOn).toBe('2027-01-01');
  });

  it('is due within a year and overdue after its day', () => {
    expect(ask({ calendarOn: '2027-06-01' }).due).toBe('due');
    expect(ask({ calendarOn: '2027-06-02' }).due).toBe('in-date');
    expect(ask({ calendarOn: '2026-06-01' }).due).toBe('due');
    expect(ask({ calendarOn: '2026-05-31' }).due).toBe('overdue');
    expect(ask({}).state).toBe('undated');
  });

  it('takes what an inspector allows, and lets a finding end the part whatever its allowance', () => {
    const cap = { kind: 'cap', foundOn: '2026-05-01', replaceByOn: '2027-04-01', words: 'pitting' } as const;
    expect(ask({ fatigueRuleOn: '2040-01-01', findings: [cap] })).toMatchObject({
      governingRule: 'inspection-finding',
      replaceByOn: '2027-04-01',
    });
    const end = { kind: 'ends-part', foundOn: '2026-05-20', words: 'one broken wire' } as const;
    const result = ask({
      fatigueRuleOn: '2040-01-01',
      findings: [cap, end],
      incidents: [{ happenedOn: '2026-05-19', words: 'grounding' }],
    });
    expect(result).toMatchObject({
      state: 'ended',
      replaceByOn: '2026-05-20',
      due: 'overdue',
      asks: 'replace',
    });
  });

  it('has no number while suspended, but keeps the rules that still run', () => {
    const result = ask({
      fatigueRuleOn: '2027-01-01',
      calendarOn: '2030-01-01',
      incidents: [{ happenedOn: '2026-05-19', words: 'grounding' }],
    });
    expect(result).toMatchObject({
      state: 'suspended',
      replaceByOn: null,
      governingRule: null,
      due: 'no-date',
    });
    expect(result.rules.map(({ rule }) => rule)).toEqual(['calendar']);
    expect(result.asks).toBe('inspect-after-incident');
    const old = ask({
      calendarOn: '2020-01-01',
      incidents: [{ happenedOn: '2026-05-19', words: 'grounding' }],
    });
    expect(old).toMatchObject({ state: 'suspended', due: 'overdue' });
  });

  it('asks for an inspection where the governing date is provisional, and never calls it overdue', () => {
    expect(ask({ fatigueRuleOn: '2026-01-01', fatigueProvisional: true })).toMatchObject({
      asks: 'inspect-or-confirm',
      due: 'due',
    });
    // Another rule that governs is what it is.
    expect(
      ask({ fatigueRuleOn: '2029-01-01', calendarOn: '2026-01-01', fatigueProvisional: true }),
    ).toMatchObject({ asks: 'replace', due: 'overdue' });
  });

  it('refuses days that the calendar does not have', () => {
    expect(() => ask({ calendarOn: '2026-02-30' })).toThrow(RangeError);
    expect(() => ask({ asOfOn: 'today' })).toThrow(RangeError);
  });
});

describe('days and years', () => {
  it('go there and back, down to whole days', () => {
    // 2 * 365.25 = 730.5 days: 730 after 2026-06-01 is 2028-05-31 (2028 is a leap year).
    expect(dayAfterYears('2026-06-01', 2)).toBe('2028-05-31');
    expect(dayAfterYears('2026-06-01', 101)).toBeNull();
    expect(yearsBetween('2026-06-01', '2028-06-01')).toBeCloseTo(731 / 365.25, 12);
    expect(yearsBetween('2028-06-01', '2026-06-01')).toBeLessThan(0);
  });
});
