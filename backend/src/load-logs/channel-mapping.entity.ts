import { Entity, PrimaryKey, Unique } from '@mikro-orm/core';
import type { LOAD_UNITS } from '@stayledger/shared/contracts/load-logs';
import { InstantColumn, References, TextColumn } from '../database/columns.js';
import { Position } from '../rig/position.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** What a column of this vessel's logs was matched to last time, to offer the same again. */
@Entity({ tableName: 'channel_mapping' })
@Unique({ name: 'channel_mapping_column', properties: ['vessel', 'columnName'] })
export class ChannelMapping {
  @PrimaryKey({ type: 'uuid', columnType: 'uuid' })
  id!: string;

  @References(() => Vessel)
  vessel!: string;

  @TextColumn()
  columnName!: string;

  @TextColumn()
  unit!: (typeof LOAD_UNITS)[number];

  @References(() => Position)
  position!: string;

  @InstantColumn()
  updatedAt!: Date;
}
