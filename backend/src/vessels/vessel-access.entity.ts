import { Check, Entity, Index, PrimaryKey } from '@mikro-orm/core';
import { ChoiceColumn, InstantColumn, References, TextColumn } from '../database/columns.js';
import { User } from '../users/user.entity.js';
import { Vessel } from './vessel.entity.js';

export const ACCESS_ROLES = ['surveyor', 'rigger', 'owner', 'insurer'] as const;
export type AccessRole = (typeof ACCESS_ROLES)[number];

/** The only source of reach: who may see a vessel, in which capacity, until when. */
@Entity({ tableName: 'vessel_access' })
@Check({
  name: 'vessel_access_party_check',
  expression: `party ~ '^(firm|user):[0-9a-f-]{36}$'`,
})
@Index({ name: 'vessel_access_party', properties: ['party', 'vessel'] })
export class VesselAccess {
  @PrimaryKey({ type: 'uuid', columnType: 'uuid' })
  id!: string;

  @Index({ name: 'vessel_access_vessel' })
  @References(() => Vessel)
  vessel!: string;

  /** `firm:<id>` or `user:<id>`. */
  @TextColumn()
  party!: string;

  @ChoiceColumn(ACCESS_ROLES)
  role!: AccessRole;

  /** Null: until it is withdrawn. */
  @InstantColumn({ nullable: true })
  endsAt: Date | null = null;

  @References(() => User, { nullable: true, fieldName: 'granted_by' })
  grantedBy: string | null = null;

  @InstantColumn()
  createdAt!: Date;
}
