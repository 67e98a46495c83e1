import { Entity, Index, PrimaryKey } from '@mikro-orm/core';
import { BooleanColumn, InstantColumn, TextColumn } from '../database/columns.js';

/** One attempt to sign in. Counted per account, since an attacker changes addresses more easily than accounts. */
@Entity({ tableName: 'sign_in_attempt' })
@Index({ name: 'sign_in_attempt_account', properties: ['accountKey', 'attemptedAt'] })
export class SignInAttempt {
  @PrimaryKey({ type: 'uuid', columnType: 'uuid' })
  id!: string;

  /** SHA-256 of the e-mail address tried: people sometimes type their password into the wrong field. */
  @TextColumn()
  accountKey!: string;

  @TextColumn()
  address!: string;

  @BooleanColumn()
  succeeded!: boolean;

  @InstantColumn()
  attemptedAt!: Date;
}
