import type { RerigPlanDto } from '@stayledger/shared/contracts/rerig-schedules';
import { PLAN_PREFERENCES } from '@stayledger/shared/contracts/rerig-schedules';
import type { RerigPlan } from './rerig-plan.entity.js';
import type { RerigRequest } from './rerig-request.entity.js';
import { causeWords } from './schedule-words.js';

/** A stored plan as people see it. */
export function toRerigPlanDto(row: RerigPlan, request: RerigRequest, askedByName: string): RerigPlanDto {
  const { plan, input, diff } = row;
  const labels = new Map(row.windowLabels.map(({ id, label }) => [id, label]));
  return {
    id: row.id,
    number: request.number,
    madeAt: row.createdAt.toISOString(),
    askedByName,
    change: request.change && toChange(request.change),
    canUndo: request.basePlanId !== null,
    plan: {
      ...plan,
      visits: plan.visits.map((visit) => ({
        ...visit,
        tasks: visit.tasks.map((task) => ({ ...task, partIds: [...task.partIds] })),
      })),
    },
    explanations: row.explanations,
    alternatives: PLAN_PREFERENCES.map((preference) => {
      const { visits, totalMinor, lateDays } = row.alternatives[preference];
      return {
        preference,
        totalMinor,
        lateDays,
        visits: visits.length,
        mastOutVisits: visits.filter(({ kind }) => kind !== 'aloft').length,
        startsOn: visits.map(({ startOn }) => startOn),
      };
    }),
    diff: diff && {
      isSame: diff.isSame,
      costMinor: diff.costMinor,
      visitCount: diff.visitCount,
      lateDays: diff.lateDays,
      tasksMoved: diff.tasksMoved.map(({ name, occurrence, fromOn, toOn }) => ({
        name,
        occurrence,
        fromOn,
        toOn,
      })),
      causes: diff.causes.map((cause) => causeWords(cause, labels)),
    },
    windows: input.windows.map(({ id, opensOn, closesOn }) => ({
      id,
      label: labels.get(id) ?? id,
      opensOn,
      closesOn,
    })),
    notes: row.notes,
  };
}

function toChange(change: NonNullable<RerigRequest['change']>): RerigPlanDto['change'] {
  return change.change === 'split' ? { ...change, taskIds: [...change.taskIds] } : change;
}
