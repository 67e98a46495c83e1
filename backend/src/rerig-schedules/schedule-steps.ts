import type { ScheduleState } from '@stayledger/shared/contracts/rerig-schedules';

/** Where a schedule may go from where it stands. Accepting is the owner's and stands here with the rest. */
const NEXT: Readonly<Record<ScheduleState, readonly ScheduleState[]>> = {
  draft: ['proposed'],
  proposed: ['draft', 'accepted'],
  accepted: ['draft', 'booked'],
  booked: ['draft', 'done'],
  done: ['draft'],
};

/** Whether a schedule may go from one state to another. */
export function mayGo(from: ScheduleState, to: ScheduleState): boolean {
  return NEXT[from].includes(to);
}
