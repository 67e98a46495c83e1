import type { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import { Clock } from '../common/clock/clock.js';
import { newId } from '../common/ids/new-id.js';
import { AuditEvent } from './audit-event.entity.js';

export interface Deed {
  /** `<thing>.<done>`: 'vessel.registered', 'load-log.posted'. */
  action: string;
  subjectKind: string;
  subjectId: string;
  /** Null: the service itself did it. */
  userId: string | null;
  vesselId?: string | null;
  /** What changed, in ids, numbers and names of fields; never passwords. */
  data?: Record<string, unknown>;
}

/** Notes deeds in the transaction of the deed: either both are there or neither. */
@Injectable()
export class AuditService {
  constructor(private readonly clock: Clock) {}

  /** @param em of the transaction in which the deed is done */
  async record(em: EntityManager, deed: Deed): Promise<void> {
    await em.insert(AuditEvent, {
      id: newId(),
      at: this.clock.now(),
      user: deed.userId,
      vesselId: deed.vesselId ?? null,
      action: deed.action,
      subjectKind: deed.subjectKind,
      subjectId: deed.subjectId,
      data: deed.data ?? {},
    });
  }
}
