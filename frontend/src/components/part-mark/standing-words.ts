import type { PartStandingDto } from '@stayledger/shared/contracts/rig';
import type { Formatter } from '../../lib/formatting/format';

/** As much of a standing as the mark and its word say. */
export type MarkedStanding = Pick<PartStandingDto, 'assessment' | 'allowanceUsed' | 'due'>;

/** What is known about a part besides its standing; each has its own mark and word. */
export interface PartCondition {
  /** The date hangs on an unconfirmed estimate. */
  provisional?: boolean;
  /** An inspection ended the part. */
  failed?: boolean;
  /** An incident suspended its dates until it is inspected. */
  suspended?: boolean;
}

/** The one word that stands beside the mark. */
export function standingWord(standing: MarkedStanding, condition: PartCondition = {}): string {
  if (condition.failed) return 'Failed inspection';
  if (condition.suspended) return 'Suspended';
  if (standing.due === 'overdue') return 'Overdue';
  if (standing.due === 'due') return 'Due';
  if (condition.provisional) return 'Provisional';
  if (standing.assessment === 'not-assessed') return 'Not assessed';
  if (standing.assessment === 'calendar-only') return 'Calendar only';
  return standing.due === 'in-date' ? 'In date' : 'No date yet';
}

/** Text alternative of the mark: the same things the drawing says. */
export function standingText(standing: MarkedStanding, condition: PartCondition, format: Formatter): string {
  const word = standingWord(standing, condition);
  const said = [word];
  if (standing.assessment === 'not-assessed' && word !== 'Not assessed') said.push('fatigue not assessed');
  if (standing.assessment === 'calendar-only' && word !== 'Calendar only') said.push('calendar only');
  if (standing.assessment === 'assessed' && standing.allowanceUsed !== null && !condition.suspended) {
    said.push(
      standing.allowanceUsed > 1
        ? format.allowance(standing.allowanceUsed)
        : `${format.allowance(standing.allowanceUsed)} of its allowance used`,
    );
  }
  return said.join(', ');
}
