import { EntityManager, LockMode } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { createVesselSchema, UpdateVesselInput, VesselDto } from '@stayledger/shared/contracts/vessels';
import { can } from '@stayledger/shared/permissions/permissions';
import type { z } from 'zod';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { InvalidRequestError, VersionConflictError } from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { widenReach } from '../database/reach.js';
import { Firm } from '../firms/firm.entity.js';
import { PartFigures } from '../parts/part-figures.service.js';
import { VesselAccess, type AccessRole } from './vessel-access.entity.js';
import { VesselReach } from './vessel-reach.service.js';
import { Vessel } from './vessel.entity.js';

type CreateInput = z.output<typeof createVesselSchema>;

/** Fields on which calendar rules and days depend. */
const MOVES_DATES = ['buildYear', 'useKind', 'zone'] as const;

@Injectable()
export class VesselsService {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
    private readonly reach: VesselReach,
    private readonly figures: PartFigures,
    private readonly audit: AuditService,
  ) {}

  async register(me: Principal, { firmId, ...fields }: CreateInput): Promise<VesselDto> {
    const looksAfter = lookingAfter(me, firmId);
    const now = this.clock.now();
    const vessel = this.em.create(Vessel, {
      id: newId(),
      firm: looksAfter.firmId,
      createdAt: now,
      updatedAt: now,
      ...fields,
    });
    await widenReach(this.em, vessel.id);
    await this.em.persist(vessel).flush();
    await this.em.insert(VesselAccess, {
      id: newId(),
      vessel: vessel.id,
      party: `firm:${looksAfter.firmId}`,
      role: looksAfter.role,
      endsAt: null,
      grantedBy: me.userId,
      createdAt: now,
    });
    await this.audit.record(this.em, {
      action: 'vessel.registered',
      subjectKind: 'vessel',
      subjectId: vessel.id,
      userId: me.userId,
      vesselId: vessel.id,
      data: { firmId: looksAfter.firmId },
    });
    return this.toDto(me, vessel);
  }

  async get(me: Principal, vesselId: string): Promise<VesselDto> {
    return this.toDto(me, await this.reach.findOrFail(me, vesselId, 'vessels:read'));
  }

  async update(
    me: Principal,
    vesselId: string,
    { version, ...changes }: UpdateVesselInput,
  ): Promise<VesselDto> {
    await this.reach.findOrFail(me, vesselId, 'vessels:update');
    const vessel = await this.em.findOneOrFail(
      Vessel,
      { id: vesselId },
      { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
    );
    if (vessel.version !== version) throw new VersionConflictError(await this.toDto(me, vessel));
    const movesDates = MOVES_DATES.some((key) => changes[key] !== undefined && changes[key] !== vessel[key]);
    this.em.assign(vessel, { ...changes, updatedAt: this.clock.now() });
    await this.em.flush();
    if (movesDates) await this.figures.refreshStandings(vessel.id);
    await this.audit.record(this.em, {
      action: 'vessel.updated',
      subjectKind: 'vessel',
      subjectId: vessel.id,
      userId: me.userId,
      vesselId: vessel.id,
      data: { fields: Object.keys(changes) },
    });
    return this.toDto(me, vessel);
  }

  private async toDto(me: Principal, vessel: Vessel): Promise<VesselDto> {
    const firm = await this.em.findOneOrFail(Firm, { id: vessel.firm });
    const permissions = await this.reach.permissionsOn(me, vessel.id);
    return {
      id: vessel.id,
      name: vessel.name,
      rigType: vessel.rigType,
      zone: vessel.zone,
      buildYear: vessel.buildYear,
      lengthM: vessel.lengthM,
      homePort: vessel.homePort,
      useKind: vessel.useKind,
      notes: vessel.notes,
      firmId: firm.id,
      firmName: firm.name,
      permissions: [...permissions],
      createdAt: vessel.createdAt.toISOString(),
      version: vessel.version,
    };
  }
}

/** The firm that will look after her, in the capacity of whoever registers her. */
function lookingAfter(me: Principal, wanted: string | undefined): { firmId: string; role: AccessRole } {
  const candidates = me.capacities.flatMap(({ firmId, role }) =>
    firmId !== null && (role === 'rigger' || role === 'surveyor') && can(role, 'vessels:register')
      ? [{ firmId, role }]
      : [],
  );
  const chosen = wanted === undefined ? candidates : candidates.filter(({ firmId }) => firmId === wanted);
  const firms = new Set(chosen.map(({ firmId }) => firmId));
  if (firms.size === 1) return chosen[0];
  const problem =
    firms.size === 0
      ? 'Choose a firm of yours that looks after vessels.'
      : 'Say which of your firms will look after her.';
  throw new InvalidRequestError({ firmId: [problem] });
}
