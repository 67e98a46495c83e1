import { Entity, Index, PrimaryKey, Property, Unique } from '@mikro-orm/core';
import type { LOAD_UNITS } from '@stayledger/shared/contracts/load-logs';
import { BigCountColumn } from '../database/big-count-column.js';
import { InstantColumn, IntegerColumn, NumberColumn, References, TextColumn } from '../database/columns.js';
import { Position } from '../rig/position.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { LoadLog } from './load-log.entity.js';

/** What counting found in one column of a log. Kept per mapping and engine version, never overwritten. */
@Entity({ tableName: 'log_channel' })
@Unique({
  name: 'log_channel_once',
  properties: ['loadLog', 'mappingVersion', 'engineVersion', 'columnName'],
})
export class LogChannel {
  @PrimaryKey({ type: 'uuid', columnType: 'uuid' })
  id!: string;

  @Index({ name: 'log_channel_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @References(() => LoadLog)
  loadLog!: string;

  @IntegerColumn()
  mappingVersion!: number;

  @TextColumn()
  engineVersion!: string;

  @Index({ name: 'log_channel_position' })
  @References(() => Position)
  position!: string;

  @TextColumn()
  columnName!: string;

  @TextColumn()
  unit!: (typeof LOAD_UNITS)[number];

  /** Loads were rounded to whole multiples of this. */
  @NumberColumn()
  stepKn!: number;

  @BigCountColumn()
  samples!: number;

  @BigCountColumn()
  missing!: number;

  @BigCountColumn()
  turningPoints!: number;

  @NumberColumn()
  closedCycles!: number;

  @NumberColumn({ nullable: true })
  minKn: number | null = null;

  @NumberColumn({ nullable: true })
  maxKn: number | null = null;

  @InstantColumn({ nullable: true })
  maxAt: Date | null = null;

  /** Extremes per stretch of time, see `envelope-codec.ts`; for pictures only. */
  @Property({ type: 'blob', columnType: 'bytea', nullable: true })
  envelope: Buffer | null = null;

  @InstantColumn()
  createdAt!: Date;
}
