import { Entity, PrimaryKey } from '@mikro-orm/core';
import { InstantColumn, JsonColumn } from './columns.js';

/** What the service remembers about itself, such as the day the demo was first started. */
@Entity({ tableName: 'service_setting' })
export class ServiceSetting {
  @PrimaryKey({ type: 'text', columnType: 'text' })
  key!: string;

  @JsonColumn()
  value!: unknown;

  @InstantColumn()
  updatedAt!: Date;
}
