import { LockMode } from '@mikro-orm/core';
import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { StateUsagePlanInput, UsagePlanDto } from '@stayledger/shared/contracts/life';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { VersionConflictError } from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { User } from '../users/user.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { PartStandingService } from './part-standing.service.js';
import { UsagePlan } from './usage-plan.entity.js';

/** How much a vessel is going to sail; every date of her parts hangs on it. */
@Injectable()
export class UsagePlansService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
    private readonly standings: PartStandingService,
    private readonly audit: AuditService,
    private readonly clock: Clock,
  ) {}

  async get(me: Principal, vesselId: string): Promise<{ plan: UsagePlanDto | null }> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'life:read');
    const plan = await this.em.findOne(UsagePlan, { vessel: vessel.id });
    return { plan: plan && (await this.toDto(plan)) };
  }

  /** States the plan for the first time, or another one; the dates of all parts follow in the same transaction. */
  async state(me: Principal, vesselId: string, input: StateUsagePlanInput): Promise<{ plan: UsagePlanDto }> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'usage:state');
    // Two people stating the first plan at once have no row of a plan to wait at; the vessel's row serves both.
    await this.em.lock(vessel, LockMode.PESSIMISTIC_WRITE);
    const stored = await this.em.findOne(UsagePlan, { vessel: vessel.id }, { refresh: true });
    if (stored?.version !== input.version) {
      throw new VersionConflictError(stored && (await this.toDto(stored)));
    }
    const plan = await this.write(me, vessel, stored, input);
    await this.standings.recomputeVessel(this.em, vessel.id);
    await this.audit.record(this.em, {
      userId: me.userId,
      vesselId: vessel.id,
      action: 'usage-plan.stated',
      subjectKind: 'usage-plan',
      subjectId: plan.id,
      data: { sailingHoursPerYear: plan.sailingHoursPerYear },
    });
    return { plan: await this.toDto(plan) };
  }

  private async write(
    me: Principal,
    vessel: Vessel,
    stored: UsagePlan | null,
    { sailingHoursPerYear, note = '' }: StateUsagePlanInput,
  ): Promise<UsagePlan> {
    const now = this.clock.now();
    const stated = { sailingHoursPerYear, note, statedBy: me.userId, updatedAt: now };
    const plan = stored
      ? this.em.assign(stored, stated)
      : this.em.create(UsagePlan, { id: newId(), vessel: vessel.id, createdAt: now, ...stated });
    await this.em.persist(plan).flush();
    return plan;
  }

  private async toDto(plan: UsagePlan): Promise<UsagePlanDto> {
    const user = await this.em.findOneOrFail(User, plan.statedBy);
    return {
      sailingHoursPerYear: plan.sailingHoursPerYear,
      note: plan.note,
      statedByName: user.name,
      updatedAt: plan.updatedAt.toISOString(),
      version: plan.version,
    };
  }
}
