import { EntityManager, LockMode } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type {
  LoadLogDto,
  PostLoadLogInput,
  ReverseLoadLogInput,
  SetAsideLoadLogInput,
} from '@stayledger/shared/contracts/load-logs';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { StateConflictError } from '../common/errors/app-error.js';
import { AccountService } from '../ledger/account.service.js';
import { PartStandingService } from '../life/part-standing.service.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { LoadLogReplies } from './load-log-replies.js';
import { LoadLogsService } from './load-logs.service.js';
import { PostingPlanService } from './posting-plan.service.js';

/** What people decide about a counted log. Each decision is one transaction; nothing is posted without one. */
@Injectable()
export class DecisionsService {
  constructor(
    private readonly em: EntityManager,
    private readonly logs: LoadLogsService,
    private readonly replies: LoadLogReplies,
    private readonly plan: PostingPlanService,
    private readonly accounts: AccountService,
    private readonly standings: PartStandingService,
    private readonly audit: AuditService,
    private readonly clock: Clock,
  ) {}

  /** Posts a counted log to the accounts of the parts it was recorded on, and rewrites where they stand. */
  async post(me: Principal, loadLogId: string, input: PostLoadLogInput): Promise<LoadLogDto> {
    const log = await this.logs.lockOrFail(me, loadLogId, 'load-logs:post', input.version);
    await this.lockParts(log.mapping.channels.map(({ positionId }) => positionId));
    const { parts: receivers, obstacle } = await this.plan.receivers(log);
    if (obstacle !== null) throw new StateConflictError(obstacle, await this.replies.one(log));
    const now = this.clock.now();
    this.em.assign(log, {
      state: 'posted',
      decidedBy: me.userId,
      decidedAt: now,
      decisionReason: null,
      updatedAt: now,
    });
    await this.em.flush();
    for (const part of receivers) {
      await this.accounts.settle(this.em, part, me.userId);
      await this.standings.recompute(this.em, part.id);
    }
    await this.audit.record(this.em, {
      userId: me.userId,
      vesselId: log.vessel,
      action: 'load-log.posted',
      subjectKind: 'load-log',
      subjectId: log.id,
      data: { partIds: receivers.map(({ id }) => id), sha256: log.sha256 },
    });
    return this.replies.one(log);
  }

  /**
   * Takes a posted log back, with the reason. What it recorded is reversed by further entries, the cycles between the
   * remaining logs are folded anew, and the log waits for a decision again. A part that has been taken off since is
   * corrected too: its account is history, and history may have been wrong.
   */
  async reverse(me: Principal, loadLogId: string, input: ReverseLoadLogInput): Promise<LoadLogDto> {
    const log = await this.logs.lockOrFail(me, loadLogId, 'load-logs:post', input.version);
    if (log.state !== 'posted') {
      throw new StateConflictError(
        `This log is ${log.state}; only a posted log can be taken back.`,
        await this.replies.one(log),
      );
    }
    const parts = await this.lockParts(log.mapping.channels.map(({ positionId }) => positionId));
    const now = this.clock.now();
    this.em.assign(log, {
      state: 'counted',
      decidedBy: me.userId,
      decidedAt: now,
      decisionReason: input.reason,
      updatedAt: now,
    });
    await this.em.flush();
    const changed: string[] = [];
    for (const part of parts) {
      const written = await this.accounts.settle(this.em, part, me.userId, input.reason);
      await this.standings.recompute(this.em, part.id);
      if (written > 0) changed.push(part.id);
    }
    await this.audit.record(this.em, {
      userId: me.userId,
      vesselId: log.vessel,
      action: 'load-log.reversed',
      subjectKind: 'load-log',
      subjectId: log.id,
      data: { reason: input.reason, partIds: changed, sha256: log.sha256 },
    });
    return this.replies.one(log);
  }

  /** Keeps a log out of the ledger, with the reason. */
  async setAside(me: Principal, loadLogId: string, input: SetAsideLoadLogInput): Promise<LoadLogDto> {
    const log = await this.logs.lockOrFail(me, loadLogId, 'load-logs:post', input.version);
    if (log.state !== 'counted' && log.state !== 'failed') {
      throw new StateConflictError(
        log.state === 'posted'
          ? 'This log is posted to the ledger. Take it back first; its entries are then reversed.'
          : `This log is ${log.state}; only a counted or failed log can be set aside.`,
        await this.replies.one(log),
      );
    }
    const now = this.clock.now();
    this.em.assign(log, {
      state: 'set-aside',
      decidedBy: me.userId,
      decidedAt: now,
      decisionReason: input.reason,
      updatedAt: now,
    });
    await this.em.flush();
    await this.audit.record(this.em, {
      userId: me.userId,
      vesselId: log.vessel,
      action: 'load-log.set-aside',
      subjectKind: 'load-log',
      subjectId: log.id,
      data: { reason: input.reason },
    });
    return this.replies.one(log);
  }

  /** In the order of their ids, so that two postings of different logs never wait for each other in a circle. */
  private async lockParts(positionIds: string[]): Promise<FittedPart[]> {
    return this.em.find(
      FittedPart,
      { position: { $in: positionIds } },
      { orderBy: { id: 'asc' }, lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
    );
  }
}
