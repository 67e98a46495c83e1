import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import { describe, expect, it } from 'vitest';
import { usedSoFar } from './allowance-series';

const day = (dayOn: string, allowance: number) => ({ dayOn, allowance, maxKn: null, loadLogId: 'log' });

function life(days: ReturnType<typeof day>[], allowanceUsed: number | null, asOfOn = '2026-09-01') {
  const standing: PartLifeDto['standing'] = {
    assessment: 'assessed',
    notAssessedReason: null,
    loadBasis: 'measured',
    allowanceUsed,
    governingDetail: 'Upper terminal',
    loggedHours: 40,
    fatigueReplaceByOn: null,
    calendarReplaceByOn: null,
    replaceByOn: null,
    governingRule: null,
    remainingYears: null,
    due: 'no-date',
  };
  return { days, asOfOn, standing };
}

describe('usedSoFar', () => {
  it('adds the days up from nothing to the standing of today', () => {
    const points = usedSoFar(life([day('2026-06-01', 0.125), day('2026-06-03', 0.25)], 0.5));
    expect(points).toEqual([
      { on: '2026-05-31', allowance: 0 },
      { on: '2026-06-01', allowance: 0.125 },
      { on: '2026-06-03', allowance: 0.375 },
      { on: '2026-09-01', allowance: 0.5 },
    ]);
  });

  it('joins two logs of one day', () => {
    const points = usedSoFar(life([day('2026-06-01', 0.125), day('2026-06-01', 0.25)], null));
    expect(points).toEqual([
      { on: '2026-05-31', allowance: 0 },
      { on: '2026-06-01', allowance: 0.375 },
    ]);
  });

  it('ends on the standing when today is itself a recorded day', () => {
    const points = usedSoFar(life([day('2026-09-01', 0.25)], 0.3));
    expect(points).toEqual([
      { on: '2026-08-31', allowance: 0 },
      { on: '2026-09-01', allowance: 0.3 },
    ]);
  });

  it('is empty before the first recorded day', () => {
    expect(usedSoFar(life([], null))).toEqual([]);
  });
});
