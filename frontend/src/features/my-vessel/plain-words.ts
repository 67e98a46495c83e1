import type { PartStandingDto, PositionDto } from '@stayledger/shared/contracts/rig';
import type { Formatter } from '../../lib/formatting/format';

/** Upper bounds of a share and how people say it. Owners read no percentages. */
const SHARES: [number, string][] = [
  [0.06, 'hardly any'],
  [0.18, 'about an eighth'],
  [0.29, 'about a quarter'],
  [0.42, 'about a third'],
  [0.58, 'about half'],
  [0.7, 'about two thirds'],
  [0.82, 'about three quarters'],
  [1, 'nearly all'],
];

/** "about two thirds": the share of an allowance that is used, in words. */
export function plainShare(ratio: number): string {
  if (ratio > 1) return 'more than all';
  if (ratio === 1) return 'all';
  return SHARES.find(([below]) => ratio < below)?.[1] ?? 'nearly all';
}

/** What is due and by when, for one part, in one sentence. */
export function plainDue(
  position: PositionDto,
  format: Formatter,
  todayOn: string,
  zone: string,
): string | null {
  const standing = position.part?.standing;
  if (!standing?.replaceByOn) return null;
  if (standing.due === 'overdue') {
    return `${position.label}: should have been replaced by ${format.day(standing.replaceByOn)}.`;
  }
  return `${position.label}: replace by ${format.dueDay(standing.replaceByOn, todayOn, zone)}.`;
}

/** Why, in one sentence. */
export function plainWhy(standing: PartStandingDto): string {
  if (standing.governingRule === 'calendar' && standing.due === 'overdue') {
    return 'It has reached the age at which parts of its kind are replaced, whatever they have carried.';
  }
  if (standing.governingRule === 'calendar') {
    return 'By then it reaches the age at which parts of its kind are replaced, whatever they have carried.';
  }
  if (standing.allowanceUsed === null) return 'By then the loads it sees have used up what it was allowed.';
  if (standing.allowanceUsed >= 1) return 'The loads recorded so far have used up what it was allowed.';
  return `The loads recorded so far have used ${plainShare(standing.allowanceUsed)} of what it was allowed; at your planned sailing the rest lasts until then.`;
}

/** Text alternative of the mark on owners' pages. */
export function plainMark(standing: PartStandingDto): string {
  const due = { overdue: 'Overdue', due: 'Due', 'in-date': 'In date', 'no-date': 'No date yet' }[
    standing.due
  ];
  if (standing.assessment === 'not-assessed') return `${due}, loads not assessed`;
  if (standing.assessment === 'calendar-only' || standing.allowanceUsed === null)
    return `${due}, by age only`;
  return `${due}, ${plainShare(standing.allowanceUsed)} of its allowance used`;
}

/** Positions by urgency: overdue first, then by date; positions without a date last, in rig order. */
export function byUrgency(positions: readonly PositionDto[]): PositionDto[] {
  const date = (position: PositionDto) => position.part?.standing.replaceByOn ?? '9999-12-31';
  return [...positions].sort((a, b) => date(a).localeCompare(date(b)));
}
