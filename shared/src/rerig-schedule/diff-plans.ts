import type { PlanInput, VisitKind } from './plan-input.js';
import type { VesselPlan } from './vessel-plan.js';

/** What of the input moved between two plans: why the plan changed. */
export type PlanCause =
  | { cause: 'due-date-moved'; taskId: string; name: string; fromOn: string | null; toOn: string | null }
  | { cause: 'task-added' | 'task-gone'; taskId: string; name: string }
  | { cause: 'task-terms-changed'; taskId: string; name: string }
  | { cause: 'window-added' | 'window-gone' | 'window-changed'; windowId: string }
  | { cause: 'visit-terms-changed'; kind: VisitKind }
  | { cause: 'decisions-changed' }
  | { cause: 'day-moved-on'; fromOn: string; toOn: string };

/** One doing of a task that is planned elsewhere, or only in one of the plans. */
export interface MovedTask {
  taskId: string;
  name: string;
  /** First doing 0, the next one 1 and so on. */
  occurrence: number;
  fromWindowId: string | null;
  toWindowId: string | null;
  fromOn: string | null;
  toOn: string | null;
}

/** What is different between two plans, ready to be put in words. */
export interface PlanDiff {
  isSame: boolean;
  visitsAdded: { windowId: string; kind: VisitKind }[];
  visitsGone: { windowId: string; kind: VisitKind }[];
  visitsOfOtherKind: { windowId: string; fromKind: VisitKind; toKind: VisitKind }[];
  tasksMoved: MovedTask[];
  /** After less before. */
  costMinor: number;
  visitCount: number;
  lateDays: number;
  causes: PlanCause[];
}

/** What changed from one plan to the next, and which inputs account for it. */
export function diffPlans(
  before: { input: PlanInput; plan: VesselPlan },
  after: { input: PlanInput; plan: VesselPlan },
): PlanDiff {
  const visitsBefore = new Map(before.plan.visits.map(({ windowId, kind }) => [windowId, kind]));
  const visitsAfter = new Map(after.plan.visits.map(({ windowId, kind }) => [windowId, kind]));
  const onlyIn = (
    one: Map<string, VisitKind>,
    other: Map<string, VisitKind>,
  ): { windowId: string; kind: VisitKind }[] =>
    [...one].filter(([windowId]) => !other.has(windowId)).map(([windowId, kind]) => ({ windowId, kind }));
  const visitsAdded = onlyIn(visitsAfter, visitsBefore);
  const visitsGone = onlyIn(visitsBefore, visitsAfter);
  const visitsOfOtherKind = [...visitsAfter].flatMap(([windowId, toKind]) => {
    const fromKind = visitsBefore.get(windowId);
    return fromKind === undefined || fromKind === toKind ? [] : [{ windowId, fromKind, toKind }];
  });
  const tasksMoved = movedTasks(before.plan, after.plan);
  return {
    isSame: [visitsAdded, visitsGone, visitsOfOtherKind, tasksMoved].every((changes) => changes.length === 0),
    visitsAdded,
    visitsGone,
    visitsOfOtherKind,
    tasksMoved,
    costMinor: after.plan.totalMinor - before.plan.totalMinor,
    visitCount: after.plan.visits.length - before.plan.visits.length,
    lateDays: after.plan.lateDays - before.plan.lateDays,
    causes: causesOf(before.input, after.input),
  };
}

function movedTasks(before: VesselPlan, after: VesselPlan): MovedTask[] {
  const [doingsBefore, doingsAfter] = [doingsOf(before), doingsOf(after)];
  return [...new Set([...doingsBefore.keys(), ...doingsAfter.keys()])].flatMap((taskId) => {
    const [from, to] = [doingsBefore.get(taskId) ?? [], doingsAfter.get(taskId) ?? []];
    return Array.from({ length: Math.max(from.length, to.length) }, (_, occurrence): MovedTask => {
      const [old, fresh] = [from[occurrence], to[occurrence]];
      return {
        taskId,
        name: (fresh ?? old).name,
        occurrence,
        fromWindowId: old?.windowId ?? null,
        toWindowId: fresh?.windowId ?? null,
        fromOn: old?.on ?? null,
        toOn: fresh?.on ?? null,
      };
    }).filter(({ fromWindowId, toWindowId }) => fromWindowId !== toWindowId);
  });
}

function doingsOf(plan: VesselPlan): Map<string, { name: string; windowId: string; on: string }[]> {
  const doings = new Map<string, { name: string; windowId: string; on: string }[]>();
  for (const { windowId, tasks } of plan.visits) {
    for (const { taskId, name, doneOn } of tasks) {
      doings.set(taskId, [...(doings.get(taskId) ?? []), { name, windowId, on: doneOn }]);
    }
  }
  return doings;
}

function causesOf(before: PlanInput, after: PlanInput): PlanCause[] {
  const causes: PlanCause[] = [];
  for (const { id: taskId, name, ...task } of after.tasks) {
    const old = before.tasks.find(({ id }) => id === taskId);
    if (old === undefined) causes.push({ cause: 'task-added', taskId, name });
    else {
      if (old.dueOn !== task.dueOn) {
        causes.push({ cause: 'due-date-moved', taskId, name, fromOn: old.dueOn, toOn: task.dueOn });
      }
      if (
        !sameJson(
          [old.terms, old.againAfterDays, old.leadDays],
          [task.terms, task.againAfterDays, task.leadDays],
        )
      ) {
        causes.push({ cause: 'task-terms-changed', taskId, name });
      }
    }
  }
  for (const { id: taskId, name } of before.tasks) {
    if (!after.tasks.some(({ id }) => id === taskId)) causes.push({ cause: 'task-gone', taskId, name });
  }
  for (const window of after.windows) {
    const old = before.windows.find(({ id }) => id === window.id);
    if (old === undefined) causes.push({ cause: 'window-added', windowId: window.id });
    else if (!sameJson(old, window)) causes.push({ cause: 'window-changed', windowId: window.id });
  }
  for (const { id } of before.windows) {
    if (!after.windows.some((window) => window.id === id))
      causes.push({ cause: 'window-gone', windowId: id });
  }
  const kinds = new Set([...Object.keys(before.visitTerms), ...Object.keys(after.visitTerms)] as VisitKind[]);
  for (const kind of kinds) {
    if (!sameJson(before.visitTerms[kind], after.visitTerms[kind])) {
      causes.push({ cause: 'visit-terms-changed', kind });
    }
  }
  if (!sameJson(before.decisions, after.decisions)) causes.push({ cause: 'decisions-changed' });
  if (before.asOfOn !== after.asOfOn) {
    causes.push({ cause: 'day-moved-on', fromOn: before.asOfOn, toOn: after.asOfOn });
  }
  return causes;
}

/** Whatever order the fields of an object come in: a plan that was stored comes back with another one. */
function sameJson(one: unknown, other: unknown): boolean {
  return JSON.stringify(one, inOrder) === JSON.stringify(other, inOrder);
}

function inOrder(_key: string, value: unknown): unknown {
  if (value === null || typeof value !== 'object' || Array.isArray(value)) return value;
  return Object.fromEntries(Object.entries(value).sort(([first], [second]) => (first < second ? -1 : 1)));
}
