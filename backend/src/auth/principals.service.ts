import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import { preferencesSchema } from '@stayledger/shared/contracts/auth';
import { ROLE_PERMISSIONS, type Permission, type Role } from '@stayledger/shared/permissions/permissions';
import { Clock } from '../common/clock/clock.js';
import { inReach } from '../database/reach.js';
import { User } from '../users/user.entity.js';
import { partiesOf, type Capacity, type Principal } from './principal.js';

/** A session ends this long after the sign-in, however busy it was. */
const ABSOLUTE_LIMIT_MS = 7 * 24 * 3_600_000;

/** Makes the principal of a session afresh for each request, so a withdrawn role or grant is felt at once. */
@Injectable()
export class PrincipalsService {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
  ) {}

  /** Null when the session no longer counts: too old, ended elsewhere, or the person was deactivated. */
  async ofSession(userId: string, signedInAt: string): Promise<Principal | null> {
    const begun = Date.parse(signedInAt);
    if (this.clock.now().getTime() - begun > ABSOLUTE_LIMIT_MS) return null;
    const em = this.em.fork();
    const user = await em.findOne(User, { id: userId });
    if (!user?.active || begun < user.sessionsValidFrom.getTime()) return null;
    return this.ofUser(user);
  }

  async ofUser(user: User): Promise<Principal> {
    const em = this.em.fork();
    const memberships: Capacity[] = await em.execute(
      `select m.role, f.id as "firmId", f.name as "firmName"
         from membership m join firm f on f.id = m.firm_id
        where m.user_id = ? and m.ended_at is null
        order by f.name, m.role`,
      [user.id],
    );
    const parties = partiesOf(user.id, memberships);
    const own: { role: Role }[] = await inReach(em, { parties, userId: user.id }, (inner) =>
      inner.execute(
        `select distinct role from vessel_access
          where party = ? and (ends_at is null or ends_at > ?) order by role`,
        [`user:${user.id}`, this.clock.now()],
      ),
    );
    const capacities = [...memberships, ...own.map(({ role }) => ({ role, firmId: null, firmName: null }))];
    return {
      userId: user.id,
      name: user.name,
      email: user.email,
      preferences: preferencesSchema.parse(user.preferences),
      version: user.version,
      capacities,
      permissions: permissionsOf(capacities),
    };
  }
}

function permissionsOf(capacities: readonly Capacity[]): ReadonlySet<Permission> {
  // Everybody keeps their own profile, also somebody whose last grant has lapsed.
  const permissions = new Set<Permission>(['profile:update']);
  for (const { role } of capacities) {
    for (const permission of ROLE_PERMISSIONS[role]) permissions.add(permission);
  }
  return permissions;
}
