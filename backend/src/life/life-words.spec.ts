import type { PartStandingDto } from '@stayledger/shared/contracts/rig';
import { allowanceInWords, dayInWords, headlineOf, plainHeadlineOf } from './life-words.js';

const assessed: PartStandingDto = {
  assessment: 'assessed',
  notAssessedReason: null,
  loadBasis: 'measured',
  allowanceUsed: 0.184,
  governingDetail: 'lower terminal',
  loggedHours: 120,
  fatigueReplaceByOn: '2041-04-12',
  calendarReplaceByOn: '2031-05-01',
  replaceByOn: '2031-05-01',
  governingRule: 'calendar',
  remainingYears: 14.8,
  due: 'in-date',
};
const base = {
  label: 'Cap shroud, port',
  standing: assessed,
  todayOn: '2026-07-01',
  plannedHoursPerYear: 400,
  calendarWords: 'Stainless strand: 10 years from the day it was fitted, 2021-05-01.',
  wouldGiveDate: [],
};

describe('dayInWords', () => {
  it.each([
    ['2027-05-12', '12 May 2027'],
    ['2027-07-01', '1 July 2027'],
    ['2027-07-02', 'summer 2027'],
    ['2028-12-01', 'winter 2028/29'],
    ['2029-02-28', 'winter 2028/29'],
    ['2029-03-01', 'spring 2029'],
    ['2029-11-30', 'autumn 2029'],
  ])('calls %s "%s" on 1 July 2026', (day, words) => {
    expect(dayInWords(day, '2026-07-01')).toBe(words);
  });
});

describe('allowanceInWords', () => {
  it.each([
    [0, '0.0 % of its fatigue allowance is used'],
    [0.00001, 'Less than 0.1 % of its fatigue allowance is used'],
    [0.042, '4.2 % of its fatigue allowance is used'],
    [0.6666, '67 % of its fatigue allowance is used'],
    [1.42, '1.4 times its fatigue allowance is used'],
  ])('%d', (used, words) => {
    expect(allowanceInWords(used)).toBe(words);
  });
});

describe('headlineOf', () => {
  it('says what is used, until when, and which rule comes first', () => {
    expect(headlineOf(base)).toBe(
      'Cap shroud, port: 18 % of its fatigue allowance is used, governed by its lower terminal. ' +
        'At the planned 400 sailing hours a year it is used up by spring 2041. ' +
        'The calendar comes first: replace by spring 2031. ' +
        'Stainless strand: 10 years from the day it was fitted, 2021-05-01.',
    );
  });

  it('names what would give a date where there is none', () => {
    const standing = {
      ...assessed,
      fatigueReplaceByOn: null,
      replaceByOn: null,
      governingRule: null,
      due: 'no-date',
    } as const;
    const words = headlineOf({
      ...base,
      standing,
      calendarWords: null,
      wouldGiveDate: ['A usage plan: the sailing hours planned per year.'],
    });
    expect(words).toContain('No fatigue date yet. It takes: a usage plan');
    expect(words).not.toContain('replace by');
  });

  it('never calls a part that is not assessed anything else', () => {
    const standing = {
      ...assessed,
      assessment: 'not-assessed',
      notAssessedReason: 'No recorded load belongs to this part.',
      allowanceUsed: null,
    } as const;
    const words = headlineOf({ ...base, standing });
    expect(words).toContain('Not assessed for fatigue. No recorded load belongs to this part.');
    expect(words).not.toContain('%');
  });
});

describe('plainHeadlineOf', () => {
  it('speaks without percentages', () => {
    expect(plainHeadlineOf(base)).toBe(
      'About a fifth of the wear this part is allowed has been used. Replace it by spring 2031, because of its age.',
    );
  });

  it('is plain about what is over', () => {
    const standing = {
      ...assessed,
      allowanceUsed: 1.4,
      replaceByOn: '2026-06-01',
      governingRule: 'fatigue',
      due: 'overdue',
    } as const;
    expect(plainHeadlineOf({ ...base, standing })).toBe(
      'The wear this part was allowed is used up. It should have been replaced by 1 June 2026, because of the loads it has carried. Speak to your rigger.',
    );
  });
});
