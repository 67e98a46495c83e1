import { Entity, Index } from '@mikro-orm/core';
import {
  LOAD_LOG_STATES,
  type LoadLogState,
  type LogFindingDto,
  type LogMapping,
} from '@stayledger/shared/contracts/load-logs';
import { BigCountColumn } from '../database/big-count-column.js';
import {
  ChoiceColumn,
  InstantColumn,
  IntegerColumn,
  JsonColumn,
  NumberColumn,
  References,
  TextColumn,
} from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { User } from '../users/user.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** One recording as it was received: the file, how it is read, what counting found, what people decided. */
@Entity({ tableName: 'load_log' })
@Index({ name: 'load_log_vessel', properties: ['vessel', 'createdAt'] })
@Index({ name: 'load_log_sha', properties: ['vessel', 'sha256'] })
@Index({
  name: 'load_log_posted_once',
  expression:
    "create unique index load_log_posted_once on load_log (vessel_id, sha256) where state = 'posted'",
})
export class LoadLog extends EditableRow {
  @References(() => Vessel)
  vessel!: string;

  @ChoiceColumn(LOAD_LOG_STATES)
  state!: LoadLogState;

  /** As people call it; never part of a path. */
  @TextColumn()
  fileName!: string;

  @BigCountColumn()
  sizeBytes!: number;

  @BigCountColumn({ default: 0 })
  receivedBytes = 0;

  @TextColumn({ nullable: true })
  sha256: string | null = null;

  /** `<vessel id>/<load log id>`; null until the first byte is announced. */
  @TextColumn({ nullable: true })
  storageKey: string | null = null;

  @JsonColumn()
  mapping!: LogMapping;

  /** Raised when the log is to be read in another way; the input version of its counting job. */
  @IntegerColumn({ default: 1 })
  mappingVersion = 1;

  @BigCountColumn({ nullable: true })
  rows: number | null = null;

  @InstantColumn({ nullable: true })
  fromAt: Date | null = null;

  @InstantColumn({ nullable: true })
  toAt: Date | null = null;

  @NumberColumn({ nullable: true })
  loggedHours: number | null = null;

  @NumberColumn({ nullable: true })
  sampleRateHz: number | null = null;

  @JsonColumn({ defaultRaw: `'[]'` })
  findings: LogFindingDto[] = [];

  @TextColumn({ nullable: true })
  engineVersion: string | null = null;

  @JsonColumn({ nullable: true })
  failure: { code: string; message: string } | null = null;

  @References(() => User, { fieldName: 'uploaded_by' })
  uploadedBy!: string;

  @References(() => User, { nullable: true, fieldName: 'decided_by' })
  decidedBy: string | null = null;

  @InstantColumn({ nullable: true })
  decidedAt: Date | null = null;

  @TextColumn({ nullable: true })
  decisionReason: string | null = null;
}
