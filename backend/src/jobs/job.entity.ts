import { Entity, Index, PrimaryKey } from '@mikro-orm/core';
import { JOB_STATES } from '@stayledger/shared/contracts/jobs';
import {
  ChoiceColumn,
  InstantColumn,
  IntegerColumn,
  JsonColumn,
  NumberColumn,
  TextColumn,
  UuidColumn,
} from '../database/columns.js';

/** Background work. PostgreSQL holds it; the queue only wakes a worker. Carries ids, never vessel data. */
@Entity({ tableName: 'job' })
@Index({
  name: 'job_open_once',
  expression:
    "create unique index job_open_once on job (kind, subject_id, input_version) where state in ('queued', 'running')",
})
@Index({
  name: 'job_open',
  expression: "create index job_open on job (state, lease_until) where state in ('queued', 'running')",
})
export class Job {
  @PrimaryKey({ type: 'uuid', columnType: 'uuid' })
  id!: string;

  @TextColumn()
  kind!: string;

  @Index({ name: 'job_subject' })
  @UuidColumn()
  subjectId!: string;

  @UuidColumn({ nullable: true })
  vesselId: string | null = null;

  @IntegerColumn()
  inputVersion!: number;

  @ChoiceColumn(JOB_STATES)
  state!: (typeof JOB_STATES)[number];

  @IntegerColumn({ default: 0 })
  attempts = 0;

  @InstantColumn({ nullable: true })
  leaseUntil: Date | null = null;

  @UuidColumn({ nullable: true })
  leaseToken: string | null = null;

  @NumberColumn({ default: 0 })
  progress = 0;

  @JsonColumn({ nullable: true })
  lastError: { code: string; message: string } | null = null;

  @InstantColumn()
  createdAt!: Date;

  @InstantColumn({ nullable: true })
  startedAt: Date | null = null;

  @InstantColumn({ nullable: true })
  finishedAt: Date | null = null;
}
