import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { LedgerCheckDto, LedgerEntryDto } from '@stayledger/shared/contracts/ledger';
import { idSchema } from '@stayledger/shared/contracts/values';
import { z } from 'zod';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { decodeCursor, type Page, toPage } from '../common/pagination/cursor.js';
import { PartDetail } from '../life/part-detail.entity.js';
import { LoadLog } from '../load-logs/load-log.entity.js';
import { User } from '../users/user.entity.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { LedgerCheck } from './ledger-check.js';
import { LedgerEntry } from './ledger-entry.entity.js';

const CURSOR = z.tuple([idSchema]);

/** Reads the accounts of fitted parts. */
@Injectable()
export class LedgerService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
    private readonly checks: LedgerCheck,
    private readonly audit: AuditService,
  ) {}

  /** Checks the ledger of a vessel, and notes that somebody did and what came of it. */
  async check(me: Principal, vesselId: string): Promise<LedgerCheckDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'ledger:check');
    const check = await this.checks.ofVessel(this.em, vessel.id);
    await this.audit.record(this.em, {
      userId: me.userId,
      vesselId: vessel.id,
      action: 'ledger.checked',
      subjectKind: 'vessel',
      subjectId: vessel.id,
      data: { entries: check.entries, differences: check.differences.length },
    });
    return check;
  }

  /** All entries of a part, newest first. */
  async entries(
    me: Principal,
    partId: string,
    query: { cursor?: string; limit: number },
  ): Promise<Page<LedgerEntryDto>> {
    const { part } = await this.reach.partOrFail(me, partId, 'ledger:read');
    const last = decodeCursor(query.cursor, CURSOR);
    const older = last === null ? {} : { id: { $lt: last[0] } };
    const found = await this.em.find(
      LedgerEntry,
      { fittedPart: part.id, ...older },
      { orderBy: { id: 'desc' }, limit: query.limit + 1 },
    );
    const { rows, nextCursor } = toPage(found, query.limit, ({ id }) => [id]);
    return { items: await this.toDtos(rows), nextCursor };
  }

  private async toDtos(entries: readonly LedgerEntry[]): Promise<LedgerEntryDto[]> {
    const idsOf = (pick: (entry: LedgerEntry) => string | null) => [
      ...new Set(entries.map(pick).filter((id) => id !== null)),
    ];
    const details = await this.em.find(PartDetail, { id: { $in: idsOf((entry) => entry.partDetail) } });
    const logs = await this.em.find(LoadLog, { id: { $in: idsOf((entry) => entry.loadLog) } });
    const users = await this.em.find(User, { id: { $in: idsOf((entry) => entry.postedBy) } });
    return entries.map((entry) => {
      const detail = details.find(({ id }) => id === entry.partDetail);
      return {
        id: entry.id,
        detailId: entry.partDetail,
        detailName: detail?.name ?? '',
        sequence: entry.sequence,
        kind: entry.kind,
        damage: entry.damage,
        allowance: entry.damage * (detail?.designFatigueFactor ?? 1),
        loadLogId: entry.loadLog,
        loadLogName: logs.find(({ id }) => id === entry.loadLog)?.fileName ?? null,
        reversesId: entry.reverses,
        curveId: entry.curve[0],
        curveVersion: entry.curve[1],
        engineVersion: entry.engineVersion,
        postedByName: users.find(({ id }) => id === entry.postedBy)?.name ?? null,
        postedAt: entry.postedAt.toISOString(),
        hash: entry.hash,
        reason: reasonOf(entry),
      };
    });
  }
}

function reasonOf({ basis }: LedgerEntry): string | null {
  const said = basis !== null && typeof basis === 'object' && 'reason' in basis ? basis.reason : null;
  return typeof said === 'string' ? said : null;
}
