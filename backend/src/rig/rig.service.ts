import { EntityManager, LockMode } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type {
  createPairSchema,
  createPositionSchema,
  PositionDto,
  RigDto,
  UpdatePositionInput,
} from '@stayledger/shared/contracts/rig';
import { positionKind, type PositionKind } from '@stayledger/shared/rig/positions';
import type { z } from 'zod';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { InvalidRequestError, VersionConflictError } from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { ConstructionsService } from '../constructions/constructions.service.js';
import { PartStanding } from '../life/part-standing.entity.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { PartFigures } from '../parts/part-figures.service.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { Position } from './position.entity.js';
import { positionLabel } from './position-label.js';
import { toPositionDto, type PartInPosition } from './position.mapper.js';

type CreateInput = z.output<typeof createPositionSchema>;
type PairInput = z.output<typeof createPairSchema>;

@Injectable()
export class RigService {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
    private readonly reach: VesselReach,
    private readonly constructions: ConstructionsService,
    private readonly figures: PartFigures,
    private readonly audit: AuditService,
  ) {}

  /** All places in rig order, each with what is fitted there now. */
  async rig(me: Principal, vesselId: string): Promise<RigDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'vessels:read');
    const positions = await this.em.find(
      Position,
      { vessel: vessel.id, archivedAt: null },
      { orderBy: { sortOrder: 'asc', label: 'asc', id: 'asc' } },
    );
    const fitted = await this.fittedIn(positions);
    const todayOn = this.clock.todayIn(vessel.zone);
    return {
      items: positions.map((position) => toPositionDto(position, fitted.get(position.id) ?? null, todayOn)),
    };
  }

  async addPosition(me: Principal, vesselId: string, input: CreateInput): Promise<PositionDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'rig:update');
    await this.lockRig(vessel);
    const kind = knownKind(input.kind);
    const label = input.label ?? positionLabel(kind.name, input.side, input.mast);
    await this.checkLabel(vessel.id, label, null);
    const now = this.clock.now();
    const position = this.em.create(Position, {
      id: newId(),
      vessel: vessel.id,
      kind: input.kind,
      side: input.side,
      label,
      mast: input.mast,
      sortOrder: kind.order,
      createdAt: now,
      updatedAt: now,
    });
    await this.em.persist(position).flush();
    await this.audit.record(this.em, {
      action: 'position.added',
      subjectKind: 'position',
      subjectId: position.id,
      userId: me.userId,
      vesselId: vessel.id,
      data: { kind: input.kind, side: input.side, label },
    });
    return toPositionDto(position, null, this.clock.todayIn(vessel.zone));
  }

  /** Port and starboard of one kind; a side that is there already is left alone. */
  async addPair(me: Principal, vesselId: string, input: PairInput): Promise<RigDto> {
    await this.reach.findOrFail(me, vesselId, 'rig:update');
    const sides = knownKind(input.kind).sides.filter((side) => side !== 'centre');
    if (sides.length < 2) {
      throw new InvalidRequestError({ kind: ['This place stands on the centre line; add it alone.'] });
    }
    const there = await this.em.find(Position, {
      vessel: vesselId,
      kind: input.kind,
      mast: input.mast,
      archivedAt: null,
    });
    for (const side of sides) {
      if (!there.some((position) => position.side === side)) {
        await this.addPosition(me, vesselId, { ...input, side });
      }
    }
    return this.rig(me, vesselId);
  }

  async updatePosition(
    me: Principal,
    positionId: string,
    { version, ...changes }: UpdatePositionInput,
  ): Promise<PositionDto> {
    const { vessel } = await this.reach.positionOrFail(me, positionId, 'rig:update');
    await this.lockRig(vessel);
    const position = await this.em.findOneOrFail(
      Position,
      { id: positionId },
      { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
    );
    if (position.version !== version) throw new VersionConflictError(await this.toDto(position, vessel));
    const kind = changes.kind === undefined ? undefined : knownKind(changes.kind);
    if (changes.label !== undefined) await this.checkLabel(vessel.id, changes.label, positionId);
    this.em.assign(position, {
      ...changes,
      ...(kind ? { sortOrder: kind.order } : {}),
      updatedAt: this.clock.now(),
    });
    await this.em.flush();
    // Whether losing a part drops the mast depends on its place, and with it the design fatigue factor.
    if (kind) await this.refreshPartIn(positionId, me.userId);
    await this.audit.record(this.em, {
      action: 'position.updated',
      subjectKind: 'position',
      subjectId: position.id,
      userId: me.userId,
      vesselId: vessel.id,
      data: { fields: Object.keys(changes) },
    });
    return this.toDto(position, vessel);
  }

  private async refreshPartIn(positionId: string, userId: string): Promise<void> {
    const part = await this.em.findOne(
      FittedPart,
      { position: positionId, removedOn: null },
      { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
    );
    if (part) await this.figures.refresh(part, userId);
  }

  /** Labels are unique on a vessel; two people naming places at once take turns. */
  private async lockRig(vessel: Vessel): Promise<void> {
    await this.em.execute('select 1 from vessel where id = ? for update', [vessel.id]);
  }

  private async checkLabel(vesselId: string, label: string, exceptId: string | null): Promise<void> {
    const twin = await this.em.findOne(Position, {
      vessel: vesselId,
      label,
      archivedAt: null,
      ...(exceptId === null ? {} : { id: { $ne: exceptId } }),
    });
    if (twin) {
      throw new InvalidRequestError({
        label: [`This vessel has a place called "${label}" already. Name this one differently.`],
      });
    }
  }

  private async toDto(position: Position, vessel: Vessel): Promise<PositionDto> {
    const fitted = await this.fittedIn([position]);
    return toPositionDto(position, fitted.get(position.id) ?? null, this.clock.todayIn(vessel.zone));
  }

  private async fittedIn(positions: readonly Position[]): Promise<Map<string, PartInPosition>> {
    const ids = positions.map(({ id }) => id);
    const parts = await this.em.find(FittedPart, { position: { $in: ids }, removedOn: null });
    const standings = await this.em.find(
      PartStanding,
      { fittedPart: { $in: parts.map(({ id }) => id) } },
      { refresh: true },
    );
    const standingOf = new Map(standings.map((standing) => [standing.fittedPart, standing]));
    const constructions = await this.constructions.namesOf(parts.map(({ construction }) => construction));
    return new Map(
      parts.map((part) => {
        const construction = constructions.get(part.construction.join('@'));
        if (!construction) throw new Error(`Part ${part.id} lacks its construction`);
        return [part.position, { part, construction, standing: standingOf.get(part.id) ?? null }];
      }),
    );
  }
}

function knownKind(kind: string): PositionKind {
  const known = positionKind(kind);
  if (!known) throw new InvalidRequestError({ kind: ['Choose a kind of place from the list.'] });
  return known;
}
