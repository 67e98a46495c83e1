import { Entity, Index, Unique } from '@mikro-orm/core';
import { ARTICULATIONS } from '@stayledger/shared/contracts/parts';
import type { DetailKind } from '@stayledger/shared/rig/part-detail';
import { Curve } from '../curves/curve.entity.js';
import {
  ChoiceColumn,
  NumberColumn,
  References,
  ReferencesVersion,
  TextColumn,
} from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { User } from '../users/user.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** What a person decided about a detail instead of its defaults; null leaves the default. */
@Entity({ tableName: 'detail_choice' })
@Unique({ name: 'detail_choice_key', properties: ['fittedPart', 'key'] })
export class DetailChoice extends EditableRow {
  @Index({ name: 'detail_choice_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @References(() => FittedPart)
  fittedPart!: string;

  @TextColumn()
  key!: DetailKind;

  /** `[id, version]` */
  @ReferencesVersion(() => Curve, ['curve_id', 'curve_version'], { nullable: true })
  curve: [string, number] | null = null;

  @ChoiceColumn(ARTICULATIONS, { nullable: true })
  articulation: (typeof ARTICULATIONS)[number] | null = null;

  @NumberColumn({ nullable: true })
  designFatigueFactor: number | null = null;

  /** What it rests on. */
  @TextColumn()
  evidence!: string;

  @References(() => User, { fieldName: 'confirmed_by' })
  confirmedBy!: string;
}
