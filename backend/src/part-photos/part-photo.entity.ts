import { Entity, Index } from '@mikro-orm/core';
import { InstantColumn, IntegerColumn, References, TextColumn } from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { User } from '../users/user.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** A photograph of a fitted part; the picture itself lies in the photographs' folder under this id. */
@Entity({ tableName: 'part_photo' })
export class PartPhoto extends EditableRow {
  @Index({ name: 'part_photo_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @Index({ name: 'part_photo_part' })
  @References(() => FittedPart)
  fittedPart!: string;

  @TextColumn()
  contentType!: string;

  @IntegerColumn()
  sizeBytes!: number;

  @TextColumn()
  sha256!: string;

  @TextColumn({ default: '' })
  caption = '';

  @References(() => User, { fieldName: 'added_by' })
  addedBy!: string;

  @InstantColumn({ nullable: true })
  removedAt: Date | null = null;
}
