import { LockMode } from '@mikro-orm/core';
import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type {
  AnswerPlanInput,
  MoveScheduleInput,
  RequestPlanInput,
  RerigScheduleDto,
  ScheduleSettingsInput,
} from '@stayledger/shared/contracts/rerig-schedules';
import { PLAN_RERIG } from '@stayledger/shared/queues/load-logs.queue';
import type { PlanChange } from '@stayledger/shared/rerig-schedule/change-plan';
import { DEFAULT_HORIZON_YEARS } from '@stayledger/shared/rerig-schedule/plan-input';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { InvalidRequestError, StateConflictError, VersionConflictError } from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { Firm } from '../firms/firm.entity.js';
import { Job } from '../jobs/job.entity.js';
import { toJobDto } from '../jobs/job.mapper.js';
import { JobQueue } from '../queue/job-queue.js';
import { User } from '../users/user.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { RerigPlan } from './rerig-plan.entity.js';
import { RerigRequest } from './rerig-request.entity.js';
import { RerigSchedule } from './rerig-schedule.entity.js';
import { mayGo } from './schedule-steps.js';
import { toRerigPlanDto } from './schedule.mapper.js';
import { seasonsWithoutRoom } from './seasons-without-room.js';

/** The re-rig schedule of a vessel: which plan stands, what is asked of the planner, and how far it has come. */
@Injectable()
export class RerigSchedulesService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
    private readonly queue: JobQueue,
    private readonly audit: AuditService,
    private readonly clock: Clock,
  ) {}

  async get(me: Principal, vesselId: string): Promise<RerigScheduleDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'rerig:read');
    return this.toDto(me, vessel, await this.em.findOne(RerigSchedule, { vessel: vessel.id }));
  }

  /** Plans anew in the background; the plan stands as a draft once it is made. */
  async request(me: Principal, vesselId: string, input: RequestPlanInput): Promise<RerigScheduleDto> {
    const { vessel, schedule } = await this.openFor(me, vesselId, input.version);
    const change = input.change ?? null;
    if (change !== null) await this.checkChange(schedule, change);
    await this.announce(me, vessel, schedule, change);
    return this.toDto(me, vessel, schedule);
  }

  /** Horizon and absences; a plan that keeps to them is asked for at once. */
  async settings(me: Principal, vesselId: string, input: ScheduleSettingsInput): Promise<RerigScheduleDto> {
    const { vessel, schedule } = await this.openFor(me, vesselId, input.version);
    this.em.assign(
      schedule,
      {
        horizonYears: input.horizonYears,
        absences: input.absences.map(({ reason = '', ...span }) => ({ ...span, reason })),
      },
      { mergeObjectProperties: false },
    );
    await this.announce(me, vessel, schedule, null);
    return this.toDto(me, vessel, schedule);
  }

  /** Goes back to the plan that stood before this one. Both stay stored. */
  async undo(me: Principal, vesselId: string, version: number): Promise<RerigScheduleDto> {
    const { vessel, schedule } = await this.openFor(me, vesselId, version);
    const request = schedule.plan === null ? null : await this.em.findOne(RerigRequest, schedule.plan);
    if (!request?.basePlanId) throw new StateConflictError('There is no plan before this one to go back to.');
    if (schedule.state !== 'draft') {
      throw new StateConflictError('Only a draft can be undone. Take the plan back to a draft first.');
    }
    this.em.assign(schedule, { plan: request.basePlanId, request: request.basePlanId });
    await this.save(me, schedule, 'rerig-schedule.undone', {});
    return this.toDto(me, vessel, schedule);
  }

  /** The yard's steps: proposed to the owner, booked, done, or back to a draft. */
  async move(me: Principal, vesselId: string, input: MoveScheduleInput): Promise<RerigScheduleDto> {
    const { vessel, schedule } = await this.openFor(me, vesselId, input.version);
    if (input.state === 'proposed') await this.refuseOldDates(schedule);
    await this.go(me, schedule, input.state, input.state === 'draft' ? schedule.question : null);
    return this.toDto(me, vessel, schedule);
  }

  /** The owner accepts the proposed plan, or asks about it. */
  async answer(me: Principal, vesselId: string, input: AnswerPlanInput): Promise<RerigScheduleDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'rerig:accept');
    const schedule = await this.lockedOrFail(vessel, input.version);
    if (schedule.state !== 'proposed') {
      throw new StateConflictError('There is no proposed plan to answer at the moment.');
    }
    if (input.answer === 'ask') {
      schedule.question = input.question ?? '';
      await this.save(me, schedule, 'rerig-schedule.asked', {});
    } else {
      await this.refuseLatePlan(schedule);
      await this.refuseOldDates(schedule);
      await this.go(me, schedule, 'accepted', null);
    }
    return this.toDto(me, vessel, schedule);
  }

  /** The plan that stands, for the calendar file; null where there is none to be seen. */
  async standing(
    me: Principal,
    vesselId: string,
  ): Promise<{ vessel: Vessel; plan: RerigPlan | null; state: RerigSchedule['state'] }> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'rerig:read');
    const schedule = await this.em.findOne(RerigSchedule, { vessel: vessel.id });
    const isHidden = schedule === null || (await this.isHidden(me, schedule));
    const plan = isHidden || schedule.plan === null ? null : await this.em.findOne(RerigPlan, schedule.plan);
    return { vessel, plan, state: schedule?.state ?? 'draft' };
  }

  /**
   * An accepted plan lets no part run past its date. What was past it before is no fault of the plan, which takes it as
   * soon as may be.
   */
  private async refuseLatePlan(schedule: RerigSchedule): Promise<void> {
    const { plan } = await this.em.findOneOrFail(RerigPlan, schedule.plan ?? '');
    if (plan.lateTasks.some(({ reason }) => reason !== 'overdue-already')) {
      throw new StateConflictError(
        'This plan runs past a date and cannot be accepted as it stands. Ask the rigger what can be done sooner.',
      );
    }
  }

  /** A plan made before a log, a part or the planned sailing moved a date may run past the new one. */
  private async refuseOldDates(schedule: RerigSchedule): Promise<void> {
    if (await this.datesMoved(schedule)) {
      throw new StateConflictError(
        'Dates of parts were worked out again after this plan was made. It has to be planned anew first.',
      );
    }
  }

  private async datesMoved(schedule: RerigSchedule): Promise<boolean> {
    if (schedule.plan === null || schedule.state === 'done') return false;
    const [{ moved }] = await this.em.execute<[{ moved: boolean }]>(
      `select exists (
         select 1 from part_standing s
           join fitted_part f on f.id = s.fitted_part_id and f.removed_on is null
           join rerig_plan p on p.id = ? and s.updated_at > p.created_at
          where s.vessel_id = ?) as moved`,
      [schedule.plan, schedule.vessel],
    );
    return moved;
  }

  private async go(
    me: Principal,
    schedule: RerigSchedule,
    to: RerigSchedule['state'],
    question: string | null,
  ): Promise<void> {
    if (schedule.plan === null) throw new StateConflictError('There is no plan yet.');
    if (!mayGo(schedule.state, to)) {
      throw new StateConflictError(`A plan that is ${schedule.state} cannot become ${to}.`);
    }
    const from = schedule.state;
    this.em.assign(schedule, { state: to, question });
    await this.save(me, schedule, `rerig-schedule.${to}`, { from, planId: schedule.plan });
  }

  private async announce(
    me: Principal,
    vessel: Vessel,
    schedule: RerigSchedule,
    change: PlanChange | null,
  ): Promise<void> {
    const [{ number }] = await this.em.execute<[{ number: number }]>(
      `select coalesce(max(number), 0) + 1 as number from rerig_request where vessel_id = ?`,
      [vessel.id],
    );
    const request = this.em.create(RerigRequest, {
      id: newId(),
      vessel: vessel.id,
      number,
      basePlanId: schedule.plan,
      change,
      fullSeasonIds: await seasonsWithoutRoom(this.em, vessel),
      askedBy: me.userId,
      createdAt: this.clock.now(),
    });
    await this.em.persist(request).flush();
    schedule.request = request.id;
    await this.queue.announce(this.em, {
      kind: PLAN_RERIG,
      subjectId: request.id,
      vesselId: vessel.id,
      inputVersion: 1,
    });
    await this.save(me, schedule, 'rerig-schedule.planning-asked', { change: change?.change ?? null });
  }

  /** Changes only what is there: a window the plan knows, and a visit in it. */
  private async checkChange(schedule: RerigSchedule, change: PlanChange): Promise<void> {
    if (schedule.plan === null) throw new StateConflictError('There is no plan yet to change.');
    const { plan, input } = await this.em.findOneOrFail(RerigPlan, schedule.plan);
    const fromId = 'windowId' in change ? change.windowId : change.fromWindowId;
    const visit = plan.visits.find(({ windowId }) => windowId === fromId);
    if (visit === undefined) {
      throw new InvalidRequestError({ change: ['The plan has no visit in that window.'] });
    }
    if ('toWindowId' in change && !input.windows.some(({ id }) => id === change.toWindowId)) {
      throw new InvalidRequestError({ 'change.toWindowId': ['Choose one of the windows of the yard.'] });
    }
    if ('taskIds' in change) {
      const there = new Set(visit.tasks.map(({ taskId }) => taskId));
      if (!change.taskIds.every((id) => there.has(id))) {
        throw new InvalidRequestError({ 'change.taskIds': ['Choose work of that visit.'] });
      }
    }
  }

  /** The schedule, locked, made when there is none yet; refuses what somebody else overtook. */
  private async openFor(
    me: Principal,
    vesselId: string,
    version: number | undefined,
  ): Promise<{ vessel: Vessel; schedule: RerigSchedule }> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'rerig:plan');
    // The first schedule has no row to wait at; the vessel's row serves whoever comes at the same time.
    await this.em.lock(vessel, LockMode.PESSIMISTIC_WRITE);
    const stored = await this.em.findOne(RerigSchedule, { vessel: vessel.id }, { refresh: true });
    if (stored?.version !== version) {
      throw new VersionConflictError(await this.toDto(me, vessel, stored));
    }
    if (stored !== null) return { vessel, schedule: stored };
    const now = this.clock.now();
    const schedule = this.em.create(RerigSchedule, {
      id: newId(),
      vessel: vessel.id,
      state: 'draft',
      horizonYears: DEFAULT_HORIZON_YEARS,
      absences: [],
      createdAt: now,
      updatedAt: now,
    });
    await this.em.persist(schedule).flush();
    return { vessel, schedule };
  }

  private async lockedOrFail(vessel: Vessel, version: number): Promise<RerigSchedule> {
    const schedule = await this.em.findOne(
      RerigSchedule,
      { vessel: vessel.id },
      { lockMode: LockMode.PESSIMISTIC_WRITE },
    );
    if (schedule === null) throw new StateConflictError('There is no plan yet.');
    if (schedule.version !== version) throw new VersionConflictError(null);
    return schedule;
  }

  private async save(
    me: Principal,
    schedule: RerigSchedule,
    action: string,
    data: Record<string, unknown>,
  ): Promise<void> {
    schedule.updatedAt = this.clock.now();
    await this.em.persist(schedule).flush();
    await this.audit.record(this.em, {
      userId: me.userId,
      vesselId: schedule.vessel,
      action,
      subjectKind: 'rerig-schedule',
      subjectId: schedule.id,
      data,
    });
  }

  /** A draft is the yard's own until it is proposed. */
  private async isHidden(me: Principal, schedule: RerigSchedule): Promise<boolean> {
    if (schedule.state !== 'draft') return false;
    return !(await this.reach.permissionsOn(me, schedule.vessel)).has('rerig:plan');
  }

  private async toDto(
    me: Principal,
    vessel: Vessel,
    schedule: RerigSchedule | null,
  ): Promise<RerigScheduleDto> {
    const firm = await this.em.findOneOrFail(Firm, vessel.firm);
    const hidden = schedule !== null && (await this.isHidden(me, schedule));
    const [plan, planning] =
      schedule === null || hidden
        ? [null, null]
        : [await this.planDto(schedule), await this.planningOf(schedule)];
    return {
      vesselId: vessel.id,
      todayOn: this.clock.todayIn(vessel.zone),
      firmName: firm.name,
      horizonYears: schedule?.horizonYears ?? DEFAULT_HORIZON_YEARS,
      absences: schedule?.absences ?? [],
      state: schedule?.state ?? 'draft',
      question: schedule?.question ?? null,
      version: schedule?.version ?? null,
      planning,
      plan,
      draftHidden: hidden && schedule.plan !== null,
      datesMoved: schedule !== null && !hidden && (await this.datesMoved(schedule)),
    };
  }

  private async planDto(schedule: RerigSchedule): Promise<RerigScheduleDto['plan']> {
    if (schedule.plan === null) return null;
    const row = await this.em.findOneOrFail(RerigPlan, schedule.plan);
    const request = await this.em.findOneOrFail(RerigRequest, row.id);
    const user = await this.em.findOneOrFail(User, request.askedBy);
    return toRerigPlanDto(row, request, user.name);
  }

  private async planningOf(schedule: RerigSchedule): Promise<RerigScheduleDto['planning']> {
    if (schedule.request === null || schedule.request === schedule.plan) return null;
    const job = await this.em.findOne(
      Job,
      { subjectId: schedule.request, kind: PLAN_RERIG },
      { orderBy: { createdAt: 'desc' } },
    );
    return job && toJobDto(job);
  }
}
