import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { AuditEventDto } from '@stayledger/shared/contracts/audit';
import { z } from 'zod';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { decodeCursor, toPage, type Page } from '../common/pagination/cursor.js';
import { permittedVessels, VesselReach } from '../vessels/vessel-reach.service.js';

interface Row {
  id: string;
  at: string;
  user_name: string | null;
  vessel_id: string | null;
  action: string;
  subject_kind: string;
  subject_id: string;
}

const cursorSchema = z.tuple([z.uuid()]);

@Injectable()
export class AuditEventsService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
    private readonly clock: Clock,
  ) {}

  /**
   * Newest first. Administrators see what concerns the service itself; everybody with the permission sees the events
   * of their vessels and their own deeds. Row level security alone would show events without a vessel to anybody.
   */
  async list(
    me: Principal,
    query: { cursor?: string; limit: number; vesselId?: string },
  ): Promise<Page<AuditEventDto>> {
    if (query.vesselId !== undefined) await this.reach.findOrFail(me, query.vesselId, 'audit:read');
    const before = decodeCursor(query.cursor, cursorSchema);
    const runsTheService = me.capacities.some(({ role }) => role === 'administrator');
    const permitted = permittedVessels(me, 'audit:read', this.clock.now());
    const rows: Row[] = await this.em.execute(
      `select e.id, e.at, u.name as user_name, e.vessel_id, e.action, e.subject_kind, e.subject_id
         from audit_event e left join app_user u on u.id = e.user_id
        where ((e.vessel_id is null and (? or e.user_id = ?))
            or e.vessel_id in (select v.id from vessel v where ${permitted.sql}))
          and (?::uuid is null or e.vessel_id = ?::uuid)
          and (?::uuid is null or e.id < ?::uuid)
        order by e.id desc limit ?`,
      [
        runsTheService,
        me.userId,
        ...permitted.values,
        query.vesselId ?? null,
        query.vesselId ?? null,
        before?.[0] ?? null,
        before?.[0] ?? null,
        query.limit + 1,
      ],
    );
    const page = toPage(rows, query.limit, ({ id }) => [id]);
    return { items: page.rows.map(toDto), nextCursor: page.nextCursor };
  }
}

function toDto(row: Row): AuditEventDto {
  return {
    id: row.id,
    at: new Date(row.at).toISOString(),
    userName: row.user_name,
    vesselId: row.vessel_id,
    action: row.action,
    subjectKind: row.subject_kind,
    subjectId: row.subject_id,
  };
}
