import { Entity } from '@mikro-orm/core';
import type { RigGeometry } from '@stayledger/shared/rig/geometry';
import { InstantColumn, IntegerColumn, JsonColumn, References } from '../database/columns.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** Hull and masts of a vessel as somebody entered them. Without a row they are drawn from her rig type and length. */
@Entity({ tableName: 'rig_geometry' })
export class RigGeometryRow {
  @References(() => Vessel, { primary: true })
  vessel!: string;

  @JsonColumn()
  data!: RigGeometry;

  @InstantColumn()
  createdAt!: Date;

  @InstantColumn()
  updatedAt!: Date;

  /** Raised by hand: the row's key is the vessel's. */
  @IntegerColumn({ default: 1 })
  version = 1;
}
