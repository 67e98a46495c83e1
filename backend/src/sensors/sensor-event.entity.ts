import { Entity, Index } from '@mikro-orm/core';
import { RIG_STATES, SENSOR_EVENT_KINDS } from '@stayledger/shared/contracts/sensors';
import {
  ChoiceColumn,
  DayColumn,
  InstantColumn,
  NumberColumn,
  References,
  TextColumn,
  UuidColumn,
} from '../database/columns.js';
import { User } from '../users/user.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { Sensor } from './sensor.entity.js';

/** Something done to a sensor on a day. Rows are added and never changed. */
@Entity({ tableName: 'sensor_event' })
@Index({ name: 'sensor_event_sensor', properties: ['sensor', 'doneOn'] })
export class SensorEvent {
  @UuidColumn({ primary: true })
  id!: string;

  @Index({ name: 'sensor_event_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @References(() => Sensor)
  sensor!: string;

  @ChoiceColumn(SENSOR_EVENT_KINDS)
  kind!: (typeof SENSOR_EVENT_KINDS)[number];

  @DayColumn()
  doneOn!: string;

  @NumberColumn({ nullable: true })
  readingKn: number | null = null;

  @TextColumn({ nullable: true })
  rigState: (typeof RIG_STATES)[number] | null = null;

  /** Tension the rig stood under at a zero check, where somebody measured it otherwise. */
  @NumberColumn({ nullable: true })
  statedTensionKn: number | null = null;

  @NumberColumn({ nullable: true })
  batteryHours: number | null = null;

  @TextColumn({ default: '' })
  note = '';

  @References(() => User, { fieldName: 'recorded_by' })
  recordedBy!: string;

  @InstantColumn()
  createdAt!: Date;
}
