import { OptionalProps, PrimaryKey, Property } from '@mikro-orm/core';
import { InstantColumn } from './columns.js';

/** What every editable row carries. The ORM raises `version` with each update and refuses to overwrite a newer one. */
export abstract class EditableRow {
  [OptionalProps]?: 'version';

  @PrimaryKey({ type: 'uuid', columnType: 'uuid' })
  id!: string;

  @InstantColumn()
  createdAt!: Date;

  @InstantColumn()
  updatedAt!: Date;

  @Property({ type: 'integer', columnType: 'int', version: true, default: 1 })
  version!: number;
}
