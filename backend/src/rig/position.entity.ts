import { Entity, Index } from '@mikro-orm/core';
import { SIDES } from '@stayledger/shared/contracts/rig';
import {
  ChoiceColumn,
  InstantColumn,
  IntegerColumn,
  JsonColumn,
  References,
  TextColumn,
} from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** A place on the rig. What is fitted there changes; the place stays. */
@Entity({ tableName: 'position' })
@Index({
  name: 'position_label_unique',
  expression:
    'create unique index position_label_unique on position (vessel_id, label) where archived_at is null',
})
export class Position extends EditableRow {
  @Index({ name: 'position_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @TextColumn()
  kind!: string;

  @ChoiceColumn(SIDES)
  side!: (typeof SIDES)[number];

  @TextColumn()
  label!: string;

  @TextColumn({ default: 'main' })
  mast = 'main';

  @IntegerColumn({ default: 0 })
  sortOrder = 0;

  @JsonColumn({ nullable: true })
  geometry: unknown = null;

  @InstantColumn({ nullable: true })
  archivedAt: Date | null = null;
}
