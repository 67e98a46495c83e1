import { Entity, Index, Unique } from '@mikro-orm/core';
import type { PartDetail as DescribedDetail } from '@stayledger/shared/rig/part-detail';
import { Curve } from '../curves/curve.entity.js';
import { JsonColumn, NumberColumn, References, ReferencesVersion, TextColumn } from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** What the model of a detail consists of besides its curve. */
export type StoredDetailModel = Pick<DescribedDetail, 'inputs' | 'notAssessedReason' | 'modelSdLog10N'>;

/** A place on a fitted part that can fail by itself, with the curve and inputs it is assessed by. */
@Entity({ tableName: 'part_detail' })
@Unique({ name: 'part_detail_key', properties: ['fittedPart', 'key'] })
export class PartDetail extends EditableRow {
  @Index({ name: 'part_detail_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @References(() => FittedPart)
  fittedPart!: string;

  @TextColumn()
  key!: DescribedDetail['key'];

  @TextColumn()
  name!: string;

  @TextColumn()
  kind!: DescribedDetail['kind'];

  /** `[id, version]`; null where no usable curve exists. */
  @ReferencesVersion(() => Curve, ['curve_id', 'curve_version'], { nullable: true })
  curve: [string, number] | null = null;

  @JsonColumn()
  model!: StoredDetailModel;

  @NumberColumn()
  designFatigueFactor!: number;

  @TextColumn({ default: '' })
  explanation = '';

  @JsonColumn({ defaultRaw: `'[]'` })
  estimates: string[] = [];
}
