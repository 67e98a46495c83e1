import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import {
  ROLE_PERMISSIONS,
  ROLES,
  can,
  type Permission,
  type Role,
} from '@stayledger/shared/permissions/permissions';
import { partiesOf, type Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { ForbiddenError, NotFoundError } from '../common/errors/app-error.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { Position } from '../rig/position.entity.js';
import type { AccessRole } from './vessel-access.entity.js';
import { Vessel } from './vessel.entity.js';

interface AccessRow {
  party: string;
  role: AccessRole;
}

/**
 * Answers "may this person do this to that vessel?". An access row for a firm lends its member the member's own roles
 * in that firm, except that a grant to an insurer gives no more than an insurer may do. A row for a person gives the
 * row's role. Out of reach is 404, like absent; in reach without the permission is 403.
 *
 * Works inside the transaction of the request (`ReachInterceptor`), which hides what is out of reach by itself.
 */
@Injectable()
export class VesselReach {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
  ) {}

  async findOrFail(me: Principal, vesselId: string, permission: Permission): Promise<Vessel> {
    const roles = await this.rolesOn(me, vesselId);
    const vessel =
      roles.length > 0 ? await this.em.findOne(Vessel, { id: vesselId, archivedAt: null }) : null;
    if (!vessel) throw new NotFoundError();
    if (!roles.some((role) => can(role, permission))) throw new ForbiddenError();
    return vessel;
  }

  /** A position and its vessel, asked for by the position's id. */
  async positionOrFail(
    me: Principal,
    positionId: string,
    permission: Permission,
  ): Promise<{ position: Position; vessel: Vessel }> {
    const position = await this.em.findOne(Position, { id: positionId, archivedAt: null });
    if (!position) throw new NotFoundError();
    return { position, vessel: await this.findOrFail(me, position.vessel, permission) };
  }

  /** A fitted part and its vessel, asked for by the part's id. */
  async partOrFail(
    me: Principal,
    partId: string,
    permission: Permission,
  ): Promise<{ part: FittedPart; vessel: Vessel }> {
    const part = await this.em.findOne(FittedPart, { id: partId });
    if (!part) throw new NotFoundError();
    return { part, vessel: await this.findOrFail(me, part.vessel, permission) };
  }

  /** Everything the person may do on the vessel; empty when it is out of reach. */
  async permissionsOn(me: Principal, vesselId: string): Promise<Set<Permission>> {
    const roles = await this.rolesOn(me, vesselId);
    return new Set(roles.flatMap((role) => ROLE_PERMISSIONS[role]));
  }

  private async rolesOn(me: Principal, vesselId: string): Promise<Role[]> {
    const rows: AccessRow[] = await this.em.execute(
      `select party, role from vessel_access
        where vessel_id = ? and party = any (array[?]::text[]) and (ends_at is null or ends_at > ?)`,
      [vesselId, partiesOf(me.userId, me.capacities), this.clock.now()],
    );
    return rows.flatMap((row) => rolesThrough(me, row));
  }
}

function rolesThrough(me: Principal, row: AccessRow): Role[] {
  if (row.party === `user:${me.userId}`) return [row.role];
  if (row.role === 'insurer') return ['insurer'];
  return me.capacities.flatMap(({ firmId, role }) => (row.party === `firm:${firmId}` ? [role] : []));
}

/**
 * SQL (and its values) that holds for vessels `v` on which the person has the permission: the list's counterpart of
 * `findOrFail`, so that a list never shows what a page would refuse.
 */
export function permittedVessels(
  me: Principal,
  permission: Permission,
  now: Date,
): { sql: string; values: unknown[] } {
  const firms = me.capacities.flatMap(({ firmId, role }) =>
    firmId && can(role, permission) ? [`firm:${firmId}`] : [],
  );
  const roles = ROLES.filter((role) => can(role, permission));
  return {
    sql: `exists (select 1 from vessel_access a
      where a.vessel_id = v.id and (a.ends_at is null or a.ends_at > ?)
        and ((a.party = any (array[?]::text[]) and a.role <> 'insurer') or (a.party = ? and a.role = any (array[?]::text[]))))`,
    values: [now, firms, `user:${me.userId}`, roles],
  };
}
