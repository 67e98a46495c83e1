import { Entity, Index, PrimaryKey, Unique } from '@mikro-orm/core';
import { ENTRY_KINDS } from '@stayledger/shared/contracts/ledger';
import { Curve } from '../curves/curve.entity.js';
import { BigCountColumn } from '../database/big-count-column.js';
import {
  ChoiceColumn,
  InstantColumn,
  JsonColumn,
  NumberColumn,
  References,
  ReferencesVersion,
  TextColumn,
} from '../database/columns.js';
import { PartDetail } from '../life/part-detail.entity.js';
import { LoadLog } from '../load-logs/load-log.entity.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { User } from '../users/user.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';
import type { CanonicalValue } from './canonical-json.js';

export type EntryKind = (typeof ENTRY_KINDS)[number];

/** One line of the account of a detail. The application may add lines; it can neither change nor delete one. */
@Entity({ tableName: 'ledger_entry' })
@Unique({ name: 'ledger_entry_sequence', properties: ['partDetail', 'sequence'] })
@Index({
  name: 'ledger_entry_recorded_once',
  expression:
    "create unique index ledger_entry_recorded_once on ledger_entry (part_detail_id, load_log_id, (basis ->> 'edition')) where kind = 'recorded'",
})
@Index({
  name: 'ledger_entry_reversed_once',
  expression:
    'create unique index ledger_entry_reversed_once on ledger_entry (reverses_id) where reverses_id is not null',
})
export class LedgerEntry {
  @PrimaryKey({ type: 'uuid', columnType: 'uuid' })
  id!: string;

  @Index({ name: 'ledger_entry_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @References(() => FittedPart)
  fittedPart!: string;

  @References(() => PartDetail)
  partDetail!: string;

  /** 1, 2, 3… within the detail. */
  @BigCountColumn()
  sequence!: number;

  @ChoiceColumn(ENTRY_KINDS)
  kind!: EntryKind;

  @References(() => LoadLog, { nullable: true })
  loadLog: string | null = null;

  @References(() => LedgerEntry, { nullable: true })
  reverses: string | null = null;

  /** By the design curve, before the design fatigue factor. */
  @NumberColumn()
  damage!: number;

  /** `[id, version]` */
  @ReferencesVersion(() => Curve, ['curve_id', 'curve_version'])
  curve!: [string, number];

  @TextColumn()
  engineVersion!: string;

  /** What the amount was computed from: spectra by hash, inputs of the detail. */
  @JsonColumn()
  basis!: CanonicalValue;

  @References(() => User, { nullable: true, fieldName: 'posted_by' })
  postedBy: string | null = null;

  @InstantColumn()
  postedAt!: Date;

  @TextColumn()
  previousHash!: string;

  @TextColumn()
  hash!: string;
}
