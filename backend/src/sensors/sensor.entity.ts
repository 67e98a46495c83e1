import { Entity, Index } from '@mikro-orm/core';
import { SENSOR_KINDS, type SensorScale } from '@stayledger/shared/contracts/sensors';
import {
  ChoiceColumn,
  DayColumn,
  JsonColumn,
  NumberColumn,
  References,
  TextColumn,
} from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { Position } from '../rig/position.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** A load sensor on a vessel and the place whose load it measures. */
@Entity({ tableName: 'sensor' })
export class Sensor extends EditableRow {
  @Index({ name: 'sensor_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @TextColumn()
  name!: string;

  @ChoiceColumn(SENSOR_KINDS)
  kind!: (typeof SENSOR_KINDS)[number];

  /** The place it measures; null while it lies in a locker. */
  @References(() => Position, { nullable: true })
  position: string | null = null;

  @NumberColumn({ nullable: true })
  fullScaleKn: number | null = null;

  /** Percent of full scale. */
  @NumberColumn({ nullable: true })
  errorPercent: number | null = null;

  /** What turns its reading into a force, by kind. */
  @JsonColumn({ nullable: true })
  scale: SensorScale | null = null;

  /** Places that carry the same load, with nothing joining in between: stated by a person, never inferred. */
  @JsonColumn({ defaultRaw: `'[]'` })
  inLine: string[] = [];

  @DayColumn({ nullable: true })
  placedOn: string | null = null;

  @DayColumn({ nullable: true })
  removedOn: string | null = null;

  @TextColumn({ default: '' })
  notes = '';
}
