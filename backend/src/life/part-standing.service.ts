import type { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import { calendarRule, type CalendarRule } from '@stayledger/shared/fatigue/life/calendar-rule';
import {
  partStanding,
  type PartStanding as ComputedStanding,
} from '@stayledger/shared/fatigue/life/governing-rule';
import type { Construction as ConstructionData } from '@stayledger/shared/rig/constructions';
import { Clock } from '../common/clock/clock.js';
import { Construction } from '../constructions/construction.entity.js';
import { AccountService } from '../ledger/account.service.js';
import { type LogOfPart, PartHistory } from '../ledger/part-history.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { PartDetail } from './part-detail.entity.js';
import { PartStanding } from './part-standing.entity.js';
import { replacementRule } from './reference-rules.js';
import { UsagePlan } from './usage-plan.entity.js';

/** Everything the standing of a part is computed from, kept for whoever has to explain it. */
export interface StandingBasis {
  part: FittedPart;
  vessel: Vessel;
  construction: ConstructionData;
  details: PartDetail[];
  /** Design damage by detail id. */
  damages: Map<string, number>;
  logs: LogOfPart[];
  loggedHours: number;
  plan: UsagePlan | null;
  calendar: CalendarRule | null;
  asOfOn: string;
  standing: ComputedStanding;
}

/** Computes where fitted parts stand and keeps one row per part. */
@Injectable()
export class PartStandingService {
  constructor(
    private readonly accounts: AccountService,
    private readonly history: PartHistory,
    private readonly clock: Clock,
  ) {}

  /** Rewrites the standing of one part from its account, in the running transaction. */
  async recompute(em: EntityManager, partId: string): Promise<PartStanding> {
    const basis = await this.basisOf(em, partId);
    const { part, standing } = basis;
    const governing = basis.details.find((detail) => detail.key === standing.governingDetailKey);
    const row: PartStanding = {
      fittedPart: part.id,
      vessel: part.vessel,
      assessment: standing.assessment,
      notAssessedReason: standing.notAssessedReason,
      loadBasis: standing.loadBasis,
      damage: governing ? (basis.damages.get(governing.id) ?? 0) : null,
      designFatigueFactor: governing?.designFatigueFactor ?? null,
      allowanceUsed: standing.allowanceUsed,
      governingDetail: standing.governingDetail,
      loggedHours: standing.loggedHours,
      fatigueReplaceByOn: standing.fatigueReplaceByOn,
      calendarReplaceByOn: standing.calendarReplaceByOn,
      replaceByOn: standing.replaceByOn,
      governingRule: standing.governingRule,
      remainingYears: standing.remainingYears,
      standing,
      computedOn: basis.asOfOn,
      updatedAt: this.clock.now(),
    };
    return em.upsert(PartStanding, row);
  }

  /** Rewrites the standing of every part on a vessel: a usage plan or a build year changed. */
  async recomputeVessel(em: EntityManager, vesselId: string): Promise<void> {
    const parts = await em.find(
      FittedPart,
      { vessel: vesselId, removedOn: null },
      { orderBy: { id: 'asc' } },
    );
    for (const part of parts) await this.recompute(em, part.id);
  }

  /** @param onDay day to stand on; today in the vessel's zone unless given */
  async basisOf(em: EntityManager, partId: string, onDay?: string): Promise<StandingBasis> {
    const part = await em.findOneOrFail(FittedPart, partId);
    const vessel = await em.findOneOrFail(Vessel, part.vessel);
    const [constructionId, version] = part.construction;
    const stored = await em.findOneOrFail(Construction, { id: constructionId, version });
    const construction = stored.data as ConstructionData;
    const details = await em.find(
      PartDetail,
      { fittedPart: part.id },
      { orderBy: { createdAt: 'asc', id: 'asc' } },
    );
    const damages = await this.accounts.damages(em, part.id);
    const logs = await this.history.logsOf(em, part);
    const plan = await em.findOne(UsagePlan, { vessel: vessel.id });
    const loggedHours = logs.reduce((sum, log) => sum + log.loggedHours, 0);
    const asOfOn = onDay ?? this.clock.todayIn(vessel.zone);
    const calendar = calendarOf(construction, part, vessel);
    const standing = partStanding({
      asOfOn,
      kindOfWire: construction.kindOfWire,
      loadBasis: logs.length > 0 ? 'measured' : 'none',
      loggedHours,
      plannedHoursPerYear: plan?.sailingHoursPerYear ?? null,
      details: details.map((detail) => {
        const damage = damages.get(detail.id) ?? 0;
        return {
          key: detail.key,
          name: detail.name,
          notAssessedReason: detail.model.notAssessedReason,
          damage,
          dff: detail.designFatigueFactor,
          designDamagePerSailingHour: loggedHours > 0 ? damage / loggedHours : 0,
        };
      }),
      calendar,
    });
    return {
      part,
      vessel,
      construction,
      details,
      damages,
      logs,
      loggedHours,
      plan,
      calendar,
      asOfOn,
      standing,
    };
  }
}

function calendarOf(construction: ConstructionData, part: FittedPart, vessel: Vessel): CalendarRule | null {
  const rule =
    construction.replacementRuleId === null ? undefined : replacementRule(construction.replacementRuleId);
  if (rule === undefined || rule.action !== 'replace') return null;
  return calendarRule({
    rule,
    usageClass: vessel.useKind === 'private' ? 'general' : 'hard',
    fittedOn: part.fittedOn,
    buildYear: vessel.buildYear,
  });
}
