import { Entity, Index, PrimaryKey } from '@mikro-orm/core';
import { ChoiceColumn, InstantColumn, References } from '../database/columns.js';
import { User } from '../users/user.entity.js';
import { Firm } from './firm.entity.js';

/** Roles a person can have through a firm. Owners have theirs through a vessel instead. */
export const FIRM_ROLES = ['surveyor', 'rigger', 'insurer', 'administrator'] as const;

@Entity({ tableName: 'membership' })
@Index({
  name: 'membership_current_unique',
  expression:
    'create unique index membership_current_unique on membership (user_id, firm_id, role) where ended_at is null',
})
export class Membership {
  @PrimaryKey({ type: 'uuid', columnType: 'uuid' })
  id!: string;

  @References(() => User)
  user!: string;

  @References(() => Firm)
  firm!: string;

  @ChoiceColumn(FIRM_ROLES)
  role!: (typeof FIRM_ROLES)[number];

  @InstantColumn({ nullable: true })
  endedAt: Date | null = null;

  @InstantColumn()
  createdAt!: Date;
}
