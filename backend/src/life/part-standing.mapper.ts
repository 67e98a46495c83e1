import type { PartStandingDto } from '@stayledger/shared/contracts/rig';
import { addMonths } from '@stayledger/shared/fatigue/life/days';
import type { PartStanding } from './part-standing.entity.js';

const DUE_WITHIN_MONTHS = 12;

/**
 * A stored standing as people see it on a given day. Whether a date is due or over is a matter of the day it is looked
 * at, so it is decided here and not stored.
 *
 * @param row null for a part whose standing was never computed
 * @param todayOn day in the vessel's zone
 */
export function toPartStandingDto(row: PartStanding | null, todayOn: string): PartStandingDto {
  if (row === null) return NOTHING_KNOWN;
  return {
    assessment: row.assessment,
    notAssessedReason: row.notAssessedReason,
    loadBasis: row.loadBasis,
    allowanceUsed: row.allowanceUsed,
    governingDetail: row.governingDetail,
    loggedHours: row.loggedHours,
    fatigueReplaceByOn: row.fatigueReplaceByOn,
    calendarReplaceByOn: row.calendarReplaceByOn,
    replaceByOn: row.replaceByOn,
    governingRule: row.governingRule,
    remainingYears: row.remainingYears,
    due: dueState(row, todayOn),
  };
}

function dueState(
  { replaceByOn, allowanceUsed }: Pick<PartStanding, 'replaceByOn' | 'allowanceUsed'>,
  todayOn: string,
): PartStandingDto['due'] {
  if (replaceByOn === null) return 'no-date';
  if (replaceByOn < todayOn || (allowanceUsed !== null && allowanceUsed >= 1)) return 'overdue';
  return replaceByOn <= addMonths(todayOn, DUE_WITHIN_MONTHS) ? 'due' : 'in-date';
}

const NOTHING_KNOWN: PartStandingDto = {
  assessment: 'not-assessed',
  notAssessedReason: 'The details of this part were not laid out yet.',
  loadBasis: 'none',
  allowanceUsed: null,
  governingDetail: null,
  loggedHours: 0,
  fatigueReplaceByOn: null,
  calendarReplaceByOn: null,
  replaceByOn: null,
  governingRule: null,
  remainingYears: null,
  due: 'no-date',
};
