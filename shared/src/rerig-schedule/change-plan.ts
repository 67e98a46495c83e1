import { diffPlans } from './diff-plans.js';
import type { PlanDiff } from './diff-plans.js';
import type { ProgramSolver, SolveLimits } from './mixed-integer-program.js';
import { VISIT_KINDS } from './plan-input.js';
import type { PlanDecisions, PlanInput, VisitKind } from './plan-input.js';
import { DEFAULT_LIMITS, planVessel } from './plan-vessel.js';
import type { VesselPlan } from './vessel-plan.js';

/** What a person does to a plan by hand. */
export type PlanChange =
  | { change: 'lock' | 'unlock' | 'drop'; windowId: string }
  | { change: 'move'; fromWindowId: string; toWindowId: string }
  | { change: 'split'; fromWindowId: string; toWindowId: string; taskIds: readonly string[] };

/** A changed plan and what changing it does to cost, lateness and everything else. */
export interface ChangedPlan {
  input: PlanInput;
  plan: VesselPlan;
  diff: PlanDiff;
}

/**
 * The consequences of a change by hand: the change becomes decisions, everything else is planned anew around it. Undoing
 * it is planning with the former decisions.
 *
 * @throws RangeError where the plan has no visit in the window that is to be changed
 */
export function changePlan(
  input: PlanInput,
  plan: VesselPlan,
  change: PlanChange,
  solver: ProgramSolver,
  limits: SolveLimits = DEFAULT_LIMITS,
): ChangedPlan {
  const changed: PlanInput = { ...input, decisions: decisionsAfter(input.decisions, plan, change) };
  const changedPlan = planVessel(changed, solver, limits);
  return {
    input: changed,
    plan: changedPlan,
    diff: diffPlans({ input, plan }, { input: changed, plan: changedPlan }),
  };
}

function decisionsAfter(decisions: PlanDecisions, plan: VesselPlan, change: PlanChange): PlanDecisions {
  switch (change.change) {
    case 'lock':
      return lockedIn(decisions, change.windowId, visitIn(plan, change.windowId).kind);
    case 'unlock':
      return withoutWindow(decisions, change.windowId);
    case 'drop':
      return barredFrom(decisions, change.windowId);
    case 'move': {
      const visit = visitIn(plan, change.fromWindowId);
      const taken = plan.visits.find(({ windowId }) => windowId === change.toWindowId)?.kind;
      const cleared = barredFrom(decisions, change.fromWindowId);
      const kind = taken === undefined ? visit.kind : heavier(taken, visit.kind);
      const locked = lockedIn(cleared, change.toWindowId, kind);
      return pinnedIn(
        locked,
        change.toWindowId,
        visit.tasks.map(({ taskId }) => taskId),
      );
    }
    case 'split': {
      visitIn(plan, change.fromWindowId);
      const kept = change.taskIds.map((taskId) => ({ taskId, windowId: change.fromWindowId }));
      const free = decisions.pinned.filter(
        (pin) => pin.windowId !== change.fromWindowId || !change.taskIds.includes(pin.taskId),
      );
      return pinnedIn(
        { ...decisions, pinned: free, kept: [...decisions.kept, ...kept] },
        change.toWindowId,
        change.taskIds,
      );
    }
  }
}

function visitIn(plan: VesselPlan, windowId: string): VesselPlan['visits'][number] {
  const visit = plan.visits.find((candidate) => candidate.windowId === windowId);
  if (visit === undefined) throw new RangeError(`The plan has no visit in window ${windowId}.`);
  return visit;
}

function withoutWindow(decisions: PlanDecisions, windowId: string): PlanDecisions {
  const elsewhere = (decision: { windowId: string }): boolean => decision.windowId !== windowId;
  return {
    locked: decisions.locked.filter(elsewhere),
    barred: decisions.barred.filter(elsewhere),
    pinned: decisions.pinned.filter(elsewhere),
    kept: decisions.kept,
  };
}

function barredFrom(decisions: PlanDecisions, windowId: string): PlanDecisions {
  const without = withoutWindow(decisions, windowId);
  return { ...without, barred: [...without.barred, { windowId }] };
}

function lockedIn(decisions: PlanDecisions, windowId: string, kind: VisitKind): PlanDecisions {
  const elsewhere = (decision: { windowId: string }): boolean => decision.windowId !== windowId;
  return {
    ...decisions,
    locked: [...decisions.locked.filter(elsewhere), { windowId, kind }],
    barred: decisions.barred.filter(elsewhere),
  };
}

function pinnedIn(decisions: PlanDecisions, windowId: string, taskIds: readonly string[]): PlanDecisions {
  const isOther = (decision: { taskId: string; windowId: string }): boolean =>
    decision.windowId !== windowId || !taskIds.includes(decision.taskId);
  return {
    ...decisions,
    barred: decisions.barred.filter((bar) => bar.windowId !== windowId),
    pinned: [...decisions.pinned.filter(isOther), ...taskIds.map((taskId) => ({ taskId, windowId }))],
    kept: decisions.kept.filter(isOther),
  };
}

function heavier(one: VisitKind, other: VisitKind): VisitKind {
  return VISIT_KINDS.indexOf(one) > VISIT_KINDS.indexOf(other) ? one : other;
}
