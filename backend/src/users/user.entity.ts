import { Check, Entity, Index } from '@mikro-orm/core';
import type { Preferences } from '@stayledger/shared/contracts/auth';
import { BooleanColumn, InstantColumn, JsonColumn, TextColumn } from '../database/columns.js';
import { EditableRow } from '../database/row.js';

@Entity({ tableName: 'app_user' })
@Check({ name: 'app_user_email_lower', expression: 'email = lower(email)' })
@Index({
  name: 'app_user_email_unique',
  expression: 'create unique index app_user_email_unique on app_user (email)',
})
export class User extends EditableRow {
  /** Always in lower case: one address, one account. */
  @TextColumn()
  email!: string;

  @TextColumn()
  name!: string;

  @TextColumn()
  passwordHash!: string;

  @JsonColumn({ defaultRaw: `'{}'` })
  preferences: Partial<Preferences> = {};

  /** People are deactivated, never deleted: entries and audit events keep naming them. */
  @BooleanColumn({ default: true })
  active = true;

  /** Sessions begun before this moment have ended, wherever they are stored. */
  @InstantColumn()
  sessionsValidFrom!: Date;
}
