import { Entity, PrimaryKey, PrimaryKeyProp } from '@mikro-orm/core';
import { InstantColumn, IntegerColumn, JsonColumn, References, TextColumn } from '../../database/columns.js';
import { User } from '../../users/user.entity.js';

/** A creating request that was carried out, with the reply to give again when it arrives a second time. */
@Entity({ tableName: 'idempotency_key' })
export class IdempotencyKey {
  [PrimaryKeyProp]?: ['user', 'key'];

  @References(() => User, { primary: true })
  user!: string;

  @PrimaryKey({ type: 'text', columnType: 'text' })
  key!: string;

  @TextColumn()
  route!: string;

  @TextColumn()
  requestHash!: string;

  @IntegerColumn({ nullable: true })
  status: number | null = null;

  @JsonColumn({ nullable: true })
  reply: unknown = null;

  @InstantColumn()
  createdAt!: Date;
}
