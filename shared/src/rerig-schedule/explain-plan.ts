import type { ProgramSolver, SolveLimits } from './mixed-integer-program.js';
import type { PlanDecisions, PlanInput } from './plan-input.js';
import { planVessel } from './plan-vessel.js';
import { vesselModel } from './vessel-model.js';
import type { VesselModel } from './vessel-model.js';
import type { PlannedTask, VesselPlan } from './vessel-plan.js';

/** What doing a task elsewhere would change, everything else planned anew around it. */
export interface OtherwiseCost {
  /** Where the task then falls; null: not within the horizon. */
  windowId: string | null;
  /** More than this plan, minor units; not below 0, for this plan is taken to be the cheapest. */
  costMinor: number;
  /** More visits of any kind, and more with the mast out; may be negative. */
  visits: number;
  mastOutVisits: number;
  /** More days past dates. */
  lateDays: number;
}

/** Why a task falls where it does. */
export interface TaskExplanation {
  taskId: string;
  name: string;
  windowId: string;
  dueOn: string | null;
  /**
   * 'settled': by hand. 'late': past its date, taken as soon as may be. 'cannot-wait': every later window is past its
   * date. 'shares-visit': the visit is made for others that cannot wait. 'cheapest': another window would do, and costs
   * more. 'free-choice': another window would do as well.
   */
  because: 'settled' | 'late' | 'cannot-wait' | 'shares-visit' | 'cheapest' | 'free-choice';
  /** Tasks the visit is made for, where it is shared. */
  sharedWith: { taskId: string; name: string }[];
  /** Done later than here. */
  waiting: OtherwiseCost;
  /** Done in the visit before, instead of here; null where that visit does not allow it or does not exist. */
  earlier: OtherwiseCost | null;
}

/** Stops of the solver for one of the plans compared with: proven, or within 5 s. */
export const EXPLAINING_LIMITS: SolveLimits = { timeLimitS: 5, relativeGap: 0 };

/**
 * Explains every task of a plan by planning the vessel anew with the task kept out of its window (waiting), and with the
 * task moved to the visit before. Twice as many solves as tasks: work for a background thread.
 *
 * @param plan of the same input
 */
export function explainPlan(
  input: PlanInput,
  plan: VesselPlan,
  solver: ProgramSolver,
  limits: SolveLimits = EXPLAINING_LIMITS,
): TaskExplanation[] {
  const model = vesselModel(input);
  const drafts = plan.visits.flatMap((visit, at) =>
    visit.tasks.map((task) => ({
      task,
      at,
      waiting: waitingCost(model, plan, at, task, solver, limits),
      earlier: earlierCost(model, plan, at, task, solver, limits),
    })),
  );
  return drafts.map(({ task, at, waiting, earlier }) => {
    const { windowId } = plan.visits[at];
    const anchors = drafts.filter(
      (other) => other.at === at && other.task.taskId !== task.taskId && other.waiting.lateDays > 0,
    );
    const isSettled = input.decisions.pinned.some(
      (pin) => pin.taskId === task.taskId && pin.windowId === windowId,
    );
    return {
      taskId: task.taskId,
      name: task.name,
      windowId,
      dueOn: task.dueOn,
      because: isSettled ? 'settled' : becauseOf(task, waiting, earlier, anchors.length > 0),
      sharedWith: anchors.map((anchor) => ({ taskId: anchor.task.taskId, name: anchor.task.name })),
      waiting,
      earlier,
    };
  });
}

function becauseOf(
  task: PlannedTask,
  waiting: OtherwiseCost,
  earlier: OtherwiseCost | null,
  isShared: boolean,
): TaskExplanation['because'] {
  if (task.lateDays > 0) return 'late';
  if (waiting.lateDays > 0) return 'cannot-wait';
  if (isShared) return 'shares-visit';
  return waiting.costMinor > 0 && (earlier === null || earlier.costMinor > 0 || earlier.lateDays > 0)
    ? 'cheapest'
    : 'free-choice';
}

/** The task is kept out of every window after its last doing up to and including this one. */
function waitingCost(
  model: VesselModel,
  plan: VesselPlan,
  at: number,
  { taskId }: PlannedTask,
  solver: ProgramSolver,
  limits: SolveLimits,
): OtherwiseCost {
  const before = doingBefore(plan, at, taskId);
  const here = windowNumber(model, plan.visits[at].windowId);
  const closed = model.windows.slice(before === null ? 0 : windowNumber(model, before) + 1, here + 1);
  const decisions = model.input.decisions;
  return otherwise(
    model.input,
    plan,
    taskId,
    before,
    {
      ...decisions,
      pinned: decisions.pinned.filter(
        (pin) => pin.taskId !== taskId || !closed.some(({ window }) => window.id === pin.windowId),
      ),
      kept: [...decisions.kept, ...closed.map(({ window }) => ({ taskId, windowId: window.id }))],
    },
    solver,
    limits,
  );
}

function earlierCost(
  model: VesselModel,
  plan: VesselPlan,
  at: number,
  { taskId }: PlannedTask,
  solver: ProgramSolver,
  limits: SolveLimits,
): OtherwiseCost | null {
  if (at === 0) return null;
  const { windowId, kind, tasks } = plan.visits[at - 1];
  const task = model.tasks.find((candidate) => candidate.task.id === taskId)!;
  const isOpen = !Number.isNaN(task.doneDays[windowNumber(model, windowId)]);
  const isThere = tasks.some((other) => other.taskId === taskId);
  if (isThere || !isOpen || !task.work.some((work) => work.kind === kind)) return null;
  const here = plan.visits[at].windowId;
  const { decisions } = model.input;
  return otherwise(
    model.input,
    plan,
    taskId,
    doingBefore(plan, at, taskId),
    {
      ...decisions,
      pinned: [
        ...decisions.pinned.filter((pin) => pin.taskId !== taskId || pin.windowId !== here),
        { taskId, windowId },
      ],
      kept: [...decisions.kept, { taskId, windowId: here }],
    },
    solver,
    limits,
  );
}

function otherwise(
  input: PlanInput,
  plan: VesselPlan,
  taskId: string,
  before: string | null,
  decisions: PlanDecisions,
  solver: ProgramSolver,
  limits: SolveLimits,
): OtherwiseCost {
  const other = planVessel({ ...input, decisions }, solver, limits);
  const doings = other.visits.filter(({ tasks }) => tasks.some((task) => task.taskId === taskId));
  const next = before === null ? 0 : doings.findIndex(({ windowId }) => windowId === before) + 1;
  const mastOut = (one: VesselPlan): number => one.visits.filter(({ kind }) => kind !== 'aloft').length;
  return {
    windowId: doings[next]?.windowId ?? null,
    costMinor: Math.max(0, other.totalMinor - plan.totalMinor),
    visits: other.visits.length - plan.visits.length,
    mastOutVisits: mastOut(other) - mastOut(plan),
    lateDays: Math.max(0, other.lateDays - plan.lateDays),
  };
}

/** Window of the doing before this one; null where this is the first. */
function doingBefore(plan: VesselPlan, at: number, taskId: string): string | null {
  return (
    plan.visits
      .slice(0, at)
      .reverse()
      .find(({ tasks }) => tasks.some((task) => task.taskId === taskId))?.windowId ?? null
  );
}

function windowNumber(model: VesselModel, windowId: string): number {
  return model.windows.findIndex(({ window }) => window.id === windowId);
}
