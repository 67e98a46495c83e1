import { describe, expect, it } from 'vitest';
import { calendarRule } from './calendar-rule.js';
import { type PartStandingInput, partStanding, type StandingDetail } from './governing-rule.js';

const rule = { name: 'Stainless wire', years: { hard: 7, general: 10, light: 12 } };

function detail(overrides: Partial<StandingDetail> = {}): StandingDetail {
  return {
    key: 'free-length',
    name: 'free length',
    notAssessedReason: null,
    damage: 0,
    dff: 5,
    designDamagePerSailingHour: 1e-4,
    ...overrides,
  };
}

/** At 500 hours a year and 1e-4 an hour the allowance of 1/5 lasts 4 years: 2026-01-01 + 1461 days = 2030-01-01. */
function input(overrides: Partial<PartStandingInput> = {}): PartStandingInput {
  return {
    asOfOn: '2026-01-01',
    kindOfWire: 'strand',
    loadBasis: 'measured',
    loggedHours: 120,
    plannedHoursPerYear: 500,
    details: [detail()],
    calendar: calendarRule({ rule, fittedOn: '2024-06-01', buildYear: null }),
    ...overrides,
  };
}

describe('which rule governs', () => {
  it('fatigue, when it comes first', () => {
    expect(partStanding(input())).toMatchObject({
      assessment: 'assessed',
      governingRule: 'fatigue',
      replaceByOn: '2030-01-01',
      fatigueReplaceByOn: '2030-01-01',
      calendarReplaceByOn: '2034-06-01',
      governingDetail: 'free length',
      due: 'in-date',
      wouldGiveDate: [],
    });
  });

  it('the calendar, when it comes first: a low allowance never lengthens it', () => {
    const standing = partStanding(
      input({ calendar: calendarRule({ rule, fittedOn: '2017-06-01', buildYear: null }) }),
    );
    expect(standing).toMatchObject({ governingRule: 'calendar', replaceByOn: '2027-06-01', due: 'in-date' });
    expect(standing.fatigueReplaceByOn).toBe('2030-01-01');
  });

  it('fatigue alone where the material has no calendar', () => {
    expect(partStanding(input({ calendar: null }))).toMatchObject({
      governingRule: 'fatigue',
      calendarReplaceByOn: null,
    });
  });

  it('none where neither gives a date', () => {
    expect(partStanding(input({ calendar: null, plannedHoursPerYear: null }))).toMatchObject({
      governingRule: null,
      replaceByOn: null,
      due: 'no-date',
    });
  });
});

describe('which detail governs', () => {
  const slow = detail({ key: 'pin', name: 'pin', designDamagePerSailingHour: 1e-6 });
  const fast = detail({ key: 'lower-terminal', name: 'lower terminal', designDamagePerSailingHour: 2e-4 });

  it('the one with the earliest date', () => {
    const standing = partStanding(input({ details: [slow, detail(), fast] }));
    // 2 years: 730 days.
    expect(standing).toMatchObject({ governingDetail: 'lower terminal', fatigueReplaceByOn: '2028-01-01' });
    expect(standing.details.map((one) => one.replaceByOn)).toEqual([null, '2030-01-01', '2028-01-01']);
  });

  it('the one that has used most, while there are no dates', () => {
    const standing = partStanding(
      input({
        plannedHoursPerYear: null,
        details: [detail({ damage: 0.02 }), detail({ key: 'pin', name: 'pin', damage: 0.03 })],
      }),
    );
    expect(standing.governingDetail).toBe('pin');
    expect(standing.allowanceUsed).toBeCloseTo(0.15, 12);
    expect(standing.remainingYears).toBeNull();
  });

  it('counts a detail that cannot be assessed by name, and never as good', () => {
    const standing = partStanding(
      input({
        details: [
          detail(),
          detail({
            key: 'turnbuckle-thread',
            name: 'turnbuckle thread',
            notAssessedReason: 'Size not known.',
          }),
        ],
      }),
    );
    expect(standing.assessment).toBe('assessed');
    expect(standing.notAssessedDetails).toEqual(['turnbuckle thread']);
    expect(standing.details[1]).toMatchObject({ allowanceUsed: null, replaceByOn: null });
  });
});

describe('due', () => {
  it.each([
    ['2015-12-31', 'overdue'],
    ['2016-01-01', 'due'],
    ['2017-01-01', 'due'],
    ['2017-01-02', 'in-date'],
  ])('a calendar of ten years from %s is %s on 2026-01-01', (fittedOn, due) => {
    const calendar = calendarRule({ rule, fittedOn, buildYear: null });
    expect(partStanding(input({ calendar, plannedHoursPerYear: null })).due).toBe(due);
  });

  it('is overdue once the allowance is used up, also with few hours and without a plan', () => {
    const standing = partStanding(
      input({ loggedHours: 3, plannedHoursPerYear: null, details: [detail({ damage: 0.28 })] }),
    );
    expect(standing).toMatchObject({
      due: 'overdue',
      governingRule: 'fatigue',
      replaceByOn: '2026-01-01',
      remainingYears: 0,
    });
    expect(standing.allowanceUsed).toBeCloseTo(1.4, 12);
  });
});

describe('not assessed', () => {
  it('without a load basis, with the calendar still running', () => {
    const standing = partStanding(input({ loadBasis: 'none' }));
    expect(standing).toMatchObject({
      assessment: 'not-assessed',
      notAssessedReason: 'No recorded load belongs to this part.',
      allowanceUsed: null,
      governingDetail: null,
      fatigueReplaceByOn: null,
      governingRule: 'calendar',
      replaceByOn: '2034-06-01',
    });
    expect(standing.wouldGiveDate[0]).toContain('A load log with a sensor on this part');
  });

  it('without a usable curve on any detail, naming the reasons once', () => {
    const unknown = { notAssessedReason: 'The kind of terminal is not known.' };
    const standing = partStanding(
      input({ details: [detail(unknown), detail({ key: 'pin', name: 'pin', ...unknown })] }),
    );
    expect(standing.assessment).toBe('not-assessed');
    expect(standing.notAssessedReason).toBe(
      'No detail of this part has a usable curve. The kind of terminal is not known.',
    );
    expect(standing.wouldGiveDate).toContain('pin: The kind of terminal is not known.');
  });

  it('without any described detail', () => {
    expect(partStanding(input({ details: [] })).notAssessedReason).toBe(
      'No detail of this part is described.',
    );
  });

  it('with an unknown history', () => {
    const standing = partStanding(input({ historyUnknown: true }));
    expect(standing.assessment).toBe('not-assessed');
    expect(standing.wouldGiveDate).toEqual([
      "An estimate of the hours sailed before the first log, from the owner's record.",
    ]);
  });

  it('fibre: the calendar only, whatever was recorded', () => {
    expect(partStanding(input({ kindOfWire: 'fibre', details: [] }))).toMatchObject({
      assessment: 'calendar-only',
      fatigueReplaceByOn: null,
      governingRule: 'calendar',
      wouldGiveDate: [],
    });
  });
});

describe('no fatigue date yet', () => {
  it('below 30 logged hours, with what is used so far', () => {
    const standing = partStanding(input({ loggedHours: 28.5, details: [detail({ damage: 0.01 })] }));
    expect(standing).toMatchObject({
      assessment: 'assessed',
      fatigueReplaceByOn: null,
      remainingYears: null,
    });
    expect(standing.allowanceUsed).toBeCloseTo(0.05, 12);
    expect(standing.wouldGiveDate).toEqual(['At least 30 logged sailing hours: 2 more hours would do.']);
    expect(partStanding(input({ loggedHours: 29.5 })).wouldGiveDate[0]).toContain('1 more hour would do');
  });

  it('has one from exactly 30 hours', () => {
    expect(partStanding(input({ loggedHours: 30 })).fatigueReplaceByOn).toBe('2030-01-01');
  });

  it('without a usage plan', () => {
    expect(partStanding(input({ plannedHoursPerYear: null })).wouldGiveDate).toEqual([
      'A usage plan: the sailing hours planned per year.',
    ]);
  });
});
