import { LockMode } from '@mikro-orm/core';
import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { StateYardTermsInput, YardTermsDto } from '@stayledger/shared/contracts/yard-terms';
import { can } from '@stayledger/shared/permissions/permissions';
import { STARTING_YARD_TERMS } from '@stayledger/shared/rerig-schedule/yard-terms';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { ForbiddenError, VersionConflictError } from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { Firm } from '../firms/firm.entity.js';
import { YardTermsRow } from './yard-terms.entity.js';

/** What a firm asks for its work, and when its yard is open. */
@Injectable()
export class YardTermsService {
  constructor(
    private readonly em: EntityManager,
    private readonly audit: AuditService,
    private readonly clock: Clock,
  ) {}

  async get(me: Principal): Promise<YardTermsDto> {
    const firm = await this.firmOf(me);
    return toDto(firm, await this.em.findOne(YardTermsRow, { firm: firm.id }));
  }

  async state(me: Principal, { version, terms }: StateYardTermsInput): Promise<YardTermsDto> {
    const firm = await this.firmOf(me);
    // Two people stating the first terms at once have no row to wait at; the firm's row serves both.
    await this.em.lock(firm, LockMode.PESSIMISTIC_WRITE);
    const stored = await this.em.findOne(YardTermsRow, { firm: firm.id }, { refresh: true });
    if (stored?.version !== version) throw new VersionConflictError(toDto(firm, stored));
    const now = this.clock.now();
    const closures = terms.closures.map(({ reason = '', ...span }) => ({ ...span, reason }));
    const stated = { terms: { ...terms, closures }, statedBy: me.userId, updatedAt: now };
    const row = stored
      ? this.em.assign(stored, stated, { mergeObjectProperties: false })
      : this.em.create(YardTermsRow, { id: newId(), firm: firm.id, createdAt: now, ...stated });
    await this.em.persist(row).flush();
    await this.audit.record(this.em, {
      userId: me.userId,
      action: 'yard-terms.stated',
      subjectKind: 'firm',
      subjectId: firm.id,
      data: { version: row.version },
    });
    return toDto(firm, row);
  }

  /** The firm through which the person plans; the first where there are several. */
  private async firmOf(me: Principal): Promise<Firm> {
    const capacity = me.capacities.find(({ firmId, role }) => firmId !== null && can(role, 'rerig:plan'));
    if (!capacity?.firmId) throw new ForbiddenError();
    return this.em.findOneOrFail(Firm, capacity.firmId);
  }
}

function toDto(firm: Firm, row: YardTermsRow | null): YardTermsDto {
  const { seasons, closures, ...terms } = row?.terms ?? STARTING_YARD_TERMS;
  return {
    firmId: firm.id,
    firmName: firm.name,
    currency: firm.currency,
    terms: { ...terms, seasons: [...seasons], closures: [...closures] },
    version: row?.version ?? null,
  };
}
