import { Entity, Index, PrimaryKey } from '@mikro-orm/core';
import { InstantColumn, JsonColumn, References, TextColumn, UuidColumn } from '../database/columns.js';
import { User } from '../users/user.entity.js';

/** Who did what to which thing. Written in the transaction of the deed; the application may not change or delete it. */
@Entity({ tableName: 'audit_event' })
@Index({ name: 'audit_event_vessel', properties: ['vesselId', 'at'] })
export class AuditEvent {
  @PrimaryKey({ type: 'uuid', columnType: 'uuid' })
  id!: string;

  @Index({ name: 'audit_event_at' })
  @InstantColumn()
  at!: Date;

  /** Null: the service itself. */
  @References(() => User, { nullable: true })
  user: string | null = null;

  @UuidColumn({ nullable: true })
  vesselId: string | null = null;

  @TextColumn()
  action!: string;

  @TextColumn()
  subjectKind!: string;

  @TextColumn()
  subjectId!: string;

  @JsonColumn({ defaultRaw: `'{}'` })
  data: Record<string, unknown> = {};
}
