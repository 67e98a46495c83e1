import type { TaskExplanation } from './explain-plan.js';
import type { VesselPlan } from './vessel-plan.js';

/** How days and money are shown to the person who reads. */
export interface ExplanationFormat {
  day: (day: string) => string;
  money: (minor: number) => string;
}

/**
 * One explanation in a sentence: "Replace by March 2029; taken in the visit of October 2028 because the mast is out for
 * the forestay; waiting would cost 2,400 and one more lift."
 *
 * @param plan the plan the explanation belongs to
 */
export function explanationWords(
  explanation: TaskExplanation,
  plan: VesselPlan,
  format: ExplanationFormat,
): string {
  const visit = plan.visits.find(({ windowId }) => windowId === explanation.windowId)!;
  const task = visit.tasks.find(({ taskId }) => taskId === explanation.taskId)!;
  const verb = task.action === 'replace' ? 'Replace' : 'Inspect';
  const due = explanation.dueOn === null ? verb : `${verb} by ${format.day(explanation.dueOn)}`;
  const start = `taken in the visit of ${format.day(visit.startOn)}`;
  return `${due}; ${start} ${reason(explanation, visit.kind !== 'aloft')}${waiting(explanation, format)}.`;
}

function reason({ because, sharedWith }: TaskExplanation, mastIsOut: boolean): string {
  switch (because) {
    case 'settled':
      return 'because it was settled by hand';
    case 'late':
      return 'because no earlier window allows it';
    case 'cannot-wait':
      return 'because the next window would be past its date';
    case 'shares-visit': {
      const names = sharedWith.map(({ name }) => name).join(', ');
      return mastIsOut ? `because the mast is out for ${names}` : `because the rigger is aloft for ${names}`;
    }
    case 'cheapest':
      return 'because the whole plan costs least so';
    case 'free-choice':
      return 'though another visit would do as well';
  }
}

function waiting({ because, waiting: wait }: TaskExplanation, format: ExplanationFormat): string {
  if (because === 'late' || because === 'settled') return '';
  if (wait.lateDays > 0)
    return `; waiting would run ${wait.lateDays} ${wait.lateDays === 1 ? 'day' : 'days'} past a date`;
  if (wait.costMinor === 0) return '; waiting would cost nothing';
  const lifts =
    wait.mastOutVisits > 0
      ? ` and take the mast out ${wait.mastOutVisits === 1 ? 'once' : `${wait.mastOutVisits} times`} more`
      : wait.visits > 0
        ? ` and take ${wait.visits === 1 ? 'one more visit' : `${wait.visits} more visits`}`
        : '';
  return `; waiting would cost ${format.money(wait.costMinor)}${lifts}`;
}
