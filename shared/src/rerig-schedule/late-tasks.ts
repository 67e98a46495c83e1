import { dayOfNumber } from '../fatigue/life/days.js';
import { dutyNetworks } from './duty-network.js';
import { NO_DECISIONS } from './plan-input.js';
import { dutyOutcomes } from './read-plan.js';
import type { DutyOutcome, VesselChoice } from './read-plan.js';
import { vesselModel } from './vessel-model.js';
import type { VesselModel } from './vessel-model.js';
import type { LateReason, LateTask } from './vessel-plan.js';

/**
 * The tasks a choice lets run past their dates, each with the reason: its own (no plan keeps it in time), a decision
 * made by hand, or another vessel's or task's need of the same window.
 */
export function lateTasksOf(model: VesselModel, choice: VesselChoice): LateTask[] {
  const late = dutyOutcomes(model, choice).filter(({ lateDays }) => lateDays > 0);
  if (late.length === 0) return [];
  const free = vesselModel({ ...model.input, decisions: NO_DECISIONS });
  const leastWithDecisions = leastLateDays(model);
  const leastFree = leastLateDays(free);
  return late.map((outcome) => {
    const { task } = model.tasks[outcome.taskIndex];
    const step = outcome.steps.find(({ lateDays }) => lateDays > 0)!;
    const reason = reasonOf(model, outcome, leastWithDecisions, leastFree);
    return {
      taskId: task.id,
      name: task.name,
      dueOn: dayOfNumber(step.dueDay),
      doneOn: step.window === null ? null : dayOfNumber(step.doneDay),
      lateDays: outcome.lateDays,
      reason,
      words: WORDS[reason](task.name),
    };
  });
}

function leastLateDays(model: VesselModel): Map<string, number> {
  return new Map(
    dutyNetworks(model, 'least-late').map((duty) => [
      model.tasks[duty.taskIndex].task.id,
      duty.leastLateDays,
    ]),
  );
}

function reasonOf(
  model: VesselModel,
  outcome: DutyOutcome,
  leastWithDecisions: Map<string, number>,
  leastFree: Map<string, number>,
): LateReason {
  const { task, dueDay, doneDays } = model.tasks[outcome.taskIndex];
  const least = leastWithDecisions.get(task.id)!;
  if (least > leastFree.get(task.id)!) return 'settled-by-hand';
  if (outcome.lateDays > least) return 'gives-way';
  if (doneDays.every((day) => Number.isNaN(day))) return 'nothing-allows-it';
  if (dueDay! < model.asOfDay) return 'overdue-already';
  return doneDays.some((day) => day <= dueDay!) ? 'windows-too-far-apart' : 'no-window-in-time';
}

const WORDS: Record<LateReason, (name: string) => string> = {
  'overdue-already': (name) => `${name}: past its date already; taken in the first window that allows it.`,
  'no-window-in-time': (name) =>
    `${name}: no window that allows it opens before its date and leaves time for its material.`,
  'windows-too-far-apart': (name) => `${name}: the windows that allow it lie further apart than it may run.`,
  'nothing-allows-it': (name) => `${name}: no window within the horizon allows this work.`,
  'settled-by-hand': (name) => `${name}: what has been settled by hand leaves no window in time.`,
  'gives-way': (name) =>
    `${name}: gives way to other work that needs the same windows, or to what has been settled by hand.`,
};
