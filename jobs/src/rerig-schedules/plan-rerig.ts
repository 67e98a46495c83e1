import { LockMode } from '@mikro-orm/core';
import type { EntityManager } from '@mikro-orm/postgresql';
import { AuditEvent } from '@stayledger/backend/audit/audit-event.entity';
import { type Clock, dayIn, newId, Vessel, withAccess } from '@stayledger/backend/persistence';
import { RerigPlan } from '@stayledger/backend/rerig-schedules/rerig-plan.entity';
import { RerigRequest } from '@stayledger/backend/rerig-schedules/rerig-request.entity';
import { RerigSchedule } from '@stayledger/backend/rerig-schedules/rerig-schedule.entity';
import { diffPlans } from '@stayledger/shared/rerig-schedule/diff-plans';
import type { PlanDiff } from '@stayledger/shared/rerig-schedule/diff-plans';
import type { TaskExplanation } from '@stayledger/shared/rerig-schedule/explain-plan';
import type { SolveLimits } from '@stayledger/shared/rerig-schedule/mixed-integer-program';
import { NO_DECISIONS } from '@stayledger/shared/rerig-schedule/plan-input';
import type { PlanInput } from '@stayledger/shared/rerig-schedule/plan-input';
import { planProblems } from '@stayledger/shared/rerig-schedule/plan-problems';
import type { VesselPlan } from '@stayledger/shared/rerig-schedule/vessel-plan';
import { vesselPlanInput, type VesselPlanInput } from '@stayledger/shared/rerig-schedule/vessel-plan-input';
import { endJob, type HeldJob, type JobFailure } from '../common/job-leases.js';
import { whileHeld } from '../common/while-held.js';
import type { PlanningThreads } from './planning-threads.js';
import { readPlanBasis } from './read-plan-basis.js';

export interface PlanningDeps {
  em: EntityManager;
  clock: Clock;
  threads: Pick<PlanningThreads, 'ask'>;
}

/** Stops of each of the plans a task's place is compared with; a vessel has some thirty of them. */
const COMPARING: SolveLimits = { timeLimitS: 2, relativeGap: 0 };

interface Begun extends VesselPlanInput {
  request: RerigRequest;
  /** The plan that stands, with the change to be made to it. */
  base: { input: PlanInput; plan: VesselPlan } | null;
}

type Made = Pick<RerigPlan, 'input' | 'plan' | 'alternatives' | 'explanations' | 'diff'>;

/**
 * Makes the plan somebody asked for: reads what it follows from, solves it in threads, and writes plan, schedule and the
 * end of the job in one transaction. Run twice it does the same as once.
 *
 * @throws LeaseLostError when another worker took over meanwhile: nothing was written
 * @throws whatever keeps the machine from planning: worth another try
 */
export async function planRerig(deps: PlanningDeps, job: HeldJob, signal: AbortSignal): Promise<void> {
  const begun = await withAccess(deps.em, { vesselId: job.vesselId }, (em) => begin(em, deps.clock, job));
  if (begun === null) {
    await withAccess(deps.em, { vesselId: job.vesselId }, (em) => endJob(em, job, 'cancelled'));
    return;
  }
  const refusal = whyNot(begun);
  if (refusal !== null) {
    await failPlanning(deps, job, refusal);
    return;
  }
  const made = await whileHeld(deps.em, job, signal, (options) => make(deps, begun, options));
  await keep(deps, job, begun, made);
}

/** Ends a planning that cannot succeed, in words a person can act on. The plan that stood goes on standing. */
export async function failPlanning(
  deps: Pick<PlanningDeps, 'em'>,
  job: HeldJob,
  failure: JobFailure,
): Promise<void> {
  await withAccess(deps.em, { vesselId: job.vesselId }, (em) => endJob(em, job, 'failed', failure));
}

/** Null when somebody asked for another plan since: only the latest is made. */
async function begin(em: EntityManager, clock: Clock, job: HeldJob): Promise<Begun | null> {
  const request = await em.findOne(RerigRequest, job.subjectId);
  const schedule = request && (await em.findOne(RerigSchedule, { vessel: request.vessel }));
  if (request === null || schedule === null || schedule.request !== request.id) return null;
  const vessel = await em.findOneOrFail(Vessel, request.vessel);
  const stored = request.basePlanId === null ? null : await em.findOne(RerigPlan, request.basePlanId);
  const base = stored && { input: stored.input, plan: stored.plan };
  const basis = await readPlanBasis(em, vessel, schedule, request, {
    asOfOn: dayIn(clock.now(), vessel.zone),
    decisions: base?.input.decisions ?? NO_DECISIONS,
  });
  return { request, base, ...vesselPlanInput(basis) };
}

function whyNot({ input, windowLabels }: Begun): JobFailure | null {
  if (input.tasks.length === 0) {
    return {
      code: 'nothing-to-plan',
      message: 'There is nothing to plan yet: fit the parts of the rig in the register first.',
    };
  }
  if (windowLabels.length === 0) {
    return {
      code: 'no-window',
      message:
        'The yard has no window for this vessel within the years planned. Change its seasons, its closures, or the times the vessel is away.',
    };
  }
  const problems = planProblems(input);
  return problems.length === 0 ? null : { code: 'unusable-terms', message: problems.join(' ') };
}

/** The plan first, then what stands beside it. */
async function make(
  { threads }: Pick<PlanningDeps, 'threads'>,
  { input, request, base }: Begun,
  { signal, onProgress }: { signal: AbortSignal; onProgress: (share: number) => void },
): Promise<Made> {
  const planned = await solved(threads, { input, request, base }, signal);
  const diff: PlanDiff | null = base === null ? null : diffPlans(base, planned);
  onProgress(0.2);
  const alternatives = await threads.ask('alternatives', { input: planned.input }, signal);
  onProgress(0.5);
  const explanations = await explained(threads, planned, signal);
  return { ...planned, alternatives, explanations, diff };
}

/** A change is made to the plan that stands, with today's dates and prices. */
async function solved(
  threads: PlanningDeps['threads'],
  { input, request, base }: Pick<Begun, 'input' | 'request' | 'base'>,
  signal: AbortSignal,
): Promise<{ input: PlanInput; plan: VesselPlan }> {
  if (request.change === null || base === null) {
    return { input, plan: await threads.ask('plan', { input }, signal) };
  }
  const changed = await threads.ask('change', { input, plan: base.plan, change: request.change }, signal);
  return { input: changed.input, plan: changed.plan };
}

/** A comparison the solver has no time for leaves the plan without its reasons, not without itself. */
async function explained(
  threads: PlanningDeps['threads'],
  planned: { input: PlanInput; plan: VesselPlan },
  signal: AbortSignal,
): Promise<TaskExplanation[]> {
  try {
    return await threads.ask('explain', { ...planned, limits: COMPARING }, signal);
  } catch (error) {
    if (signal.aborted) throw error;
    return [];
  }
}

/** Plan, schedule and end of the job: all or nothing, and nothing without the lease. */
async function keep(deps: PlanningDeps, job: HeldJob, begun: Begun, made: Made): Promise<void> {
  await withAccess(deps.em, { vesselId: job.vesselId }, async (em) => {
    const schedule = await em.findOneOrFail(
      RerigSchedule,
      { vessel: job.vesselId },
      { lockMode: LockMode.PESSIMISTIC_WRITE },
    );
    if (schedule.request !== begun.request.id) {
      await endJob(em, job, 'cancelled');
      return;
    }
    await endJob(em, job, 'done');
    const now = deps.clock.now();
    await em.insert(RerigPlan, {
      id: begun.request.id,
      vessel: job.vesselId,
      ...made,
      windowLabels: begun.windowLabels,
      notes: begun.notes,
      createdAt: now,
    });
    em.assign(schedule, { plan: begun.request.id, state: 'draft', updatedAt: now });
    await em.flush();
    await em.insert(AuditEvent, {
      id: newId(),
      at: now,
      user: null,
      vesselId: job.vesselId,
      action: 'rerig-schedule.planned',
      subjectKind: 'rerig-schedule',
      subjectId: schedule.id,
      data: {
        visits: made.plan.visits.length,
        totalMinor: made.plan.totalMinor,
        lateDays: made.plan.lateDays,
        gap: made.plan.proof.gap,
      },
    });
  });
}
