import { EntityManager, LockMode } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { ConstructionDto } from '@stayledger/shared/contracts/constructions';
import type {
  AssemblyDto,
  DescribedPartInput,
  fitPartSchema,
  FittedPartDto,
  RemovePartInput,
  UpdatePartInput,
} from '@stayledger/shared/contracts/parts';
import { isTwin } from '@stayledger/shared/rig/load-basis';
import type { z } from 'zod';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { InvalidRequestError, StateConflictError, VersionConflictError } from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { ConstructionsService } from '../constructions/constructions.service.js';
import { PartDetail } from '../life/part-detail.entity.js';
import { PartStanding } from '../life/part-standing.entity.js';
import { Position } from '../rig/position.entity.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { FittedPart } from './fitted-part.entity.js';
import { PartFigures } from './part-figures.service.js';
import { toFittedPartDto } from './part.mapper.js';
import { areaOf, assemblyOf, breakingLoadOf, terminal } from './part-strength.js';

type FitInput = z.output<typeof fitPartSchema>;
/** A whole description, as it is when a part is fitted and after a change was laid over the stored one. */
type Description = Omit<FitInput, 'alsoOtherSide'>;

@Injectable()
export class PartsService {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
    private readonly reach: VesselReach,
    private readonly constructions: ConstructionsService,
    private readonly figures: PartFigures,
    private readonly audit: AuditService,
  ) {}

  /** Fits a part into an empty position and opens its account. */
  async fit(
    me: Principal,
    positionId: string,
    { alsoOtherSide, ...input }: FitInput,
  ): Promise<FittedPartDto> {
    const { vessel, position } = await this.reach.positionOrFail(me, positionId, 'rig:update');
    if (!alsoOtherSide) return this.toDto(await this.fitOne(me, vessel, positionId, input), vessel);
    const twinId = await this.emptyTwinOf(position);
    // In the order of their ids, so that two people fitting one pair take turns and do not lock each other out.
    const parts = new Map<string, FittedPart>();
    for (const id of [positionId, twinId].sort()) parts.set(id, await this.fitOne(me, vessel, id, input));
    const part = parts.get(positionId);
    if (!part) throw new Error('A fitted part is among the fitted parts');
    return this.toDto(part, vessel);
  }

  private async emptyTwinOf(position: Position): Promise<string> {
    const { vessel, kind, mast } = position;
    const twins = (await this.em.find(Position, { vessel, kind, mast, archivedAt: null })).filter((other) =>
      isTwin(position, other),
    );
    for (const { id } of twins) {
      if ((await this.em.count(FittedPart, { position: id, removedOn: null })) === 0) return id;
    }
    throw new InvalidRequestError({
      alsoOtherSide: [
        twins.length === 0
          ? 'There is no such place on the other side. Add it first.'
          : 'The place on the other side holds a part already.',
      ],
    });
  }

  /** Fits without asking whether the person may: the caller did. */
  private async fitOne(
    me: Principal,
    vessel: Vessel,
    positionId: string,
    input: Description,
  ): Promise<FittedPart> {
    // Two people fitting into one position: the second waits here and then finds it taken.
    const position = await this.em.findOneOrFail(
      Position,
      { id: positionId },
      { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
    );
    if (await this.em.findOne(FittedPart, { position: positionId, removedOn: null })) {
      throw new StateConflictError(`${position.label} holds a part already. Record its removal first.`);
    }
    const construction = await this.constructions.newest(me, input.constructionId);
    await this.check(vessel, positionId, null, input, construction);
    const now = this.clock.now();
    const part = this.em.create(FittedPart, {
      id: newId(),
      vessel: vessel.id,
      position: positionId,
      createdAt: now,
      updatedAt: now,
      ...columnsOf(input, found(construction)),
    });
    await this.em.persist(part).flush();
    await this.figures.refresh(part, me.userId);
    await this.audit.record(this.em, {
      action: 'part.fitted',
      subjectKind: 'part',
      subjectId: part.id,
      userId: me.userId,
      vesselId: vessel.id,
      data: { positionId, constructionId: input.constructionId, diameterMm: input.diameterMm },
    });
    return part;
  }

  /** Strength of a part that is still being described. */
  async strength(me: Principal, input: DescribedPartInput): Promise<AssemblyDto> {
    const construction = await this.constructions.newest(me, input.constructionId);
    if (!construction) {
      throw new InvalidRequestError({ constructionId: ['Choose a construction from the list.'] });
    }
    const known = breakingLoadOf(construction, input.diameterMm, input.breakingLoadKn);
    if (!known) {
      throw new InvalidRequestError({
        diameterMm: ['The table has no such diameter; a certificate would do.'],
      });
    }
    const { breakingLoadKn, weakestElement, unknownElements } = assemblyOf({
      ...input,
      breakingLoadKn: known.breakingLoadKn,
    });
    return { breakingLoadKn, weakestElement, unknownElements };
  }

  async get(me: Principal, partId: string): Promise<FittedPartDto> {
    const { part, vessel } = await this.reach.partOrFail(me, partId, 'vessels:read');
    return this.toDto(part, vessel);
  }

  /** Corrects the description. The account follows by reversals and new entries; a removed part stays as it was. */
  async update(
    me: Principal,
    partId: string,
    { version, ...changes }: UpdatePartInput,
  ): Promise<FittedPartDto> {
    const { part, vessel } = await this.lock(me, partId, version);
    if (part.removedOn !== null) {
      throw new StateConflictError(
        'This part was taken off; its account is closed and its description stays.',
      );
    }
    const description = { ...descriptionOf(part), ...changes };
    const changesBreakingLoad = [
      'breakingLoadKn',
      'breakingLoadFromCertificate',
      'constructionId',
      'diameterMm',
    ];
    if (changesBreakingLoad.some((key) => key in changes) && !description.breakingLoadFromCertificate) {
      // What stands there came from the table of the size before; let the table speak again.
      description.breakingLoadKn = changes.breakingLoadKn ?? null;
    }
    const construction =
      description.constructionId === part.construction[0]
        ? await this.constructions.version(part.construction)
        : await this.constructions.newest(me, description.constructionId);
    await this.check(vessel, part.position, part.id, description, construction);
    this.em.assign(part, { ...columnsOf(description, found(construction)), updatedAt: this.clock.now() });
    await this.em.flush();
    await this.figures.refresh(part, me.userId);
    await this.audit.record(this.em, {
      action: 'part.updated',
      subjectKind: 'part',
      subjectId: part.id,
      userId: me.userId,
      vesselId: vessel.id,
      data: { fields: Object.keys(changes) },
    });
    return this.toDto(part, vessel);
  }

  /** Takes the part off: its account ends, its position is free. */
  async remove(me: Principal, partId: string, input: RemovePartInput): Promise<FittedPartDto> {
    const { part, vessel } = await this.lock(me, partId, input.version);
    if (part.removedOn !== null) throw new StateConflictError('This part was taken off already.');
    if (input.removedOn > this.clock.todayIn(vessel.zone)) {
      throw new InvalidRequestError({ removedOn: ['This day is still to come.'] });
    }
    if (part.fittedOn !== null && input.removedOn < part.fittedOn) {
      throw new InvalidRequestError({
        removedOn: [`It was fitted on ${part.fittedOn}; give that day or a later one.`],
      });
    }
    this.em.assign(part, {
      removedOn: input.removedOn,
      removedReason: input.reason,
      updatedAt: this.clock.now(),
    });
    await this.em.flush();
    await this.figures.refresh(part, me.userId);
    await this.audit.record(this.em, {
      action: 'part.removed',
      subjectKind: 'part',
      subjectId: part.id,
      userId: me.userId,
      vesselId: vessel.id,
      data: { removedOn: input.removedOn, reason: input.reason },
    });
    return this.toDto(part, vessel);
  }

  /** What the schema cannot know: the tables, the calendar and the part before. */
  private async check(
    vessel: Vessel,
    positionId: string,
    partId: string | null,
    input: Description,
    construction: ConstructionDto | null,
  ): Promise<void> {
    const errors: Record<string, string[]> = {};
    if (!construction)
      throw new InvalidRequestError({ constructionId: ['Choose a construction from the list.'] });
    for (const end of ['upperTerminal', 'lowerTerminal'] as const) {
      if (!terminal(input[end]).fitsKindOfWire.includes(construction.kindOfWire)) {
        errors[end] = [`This terminal is not made for ${construction.kindOfWire}.`];
      }
    }
    if (input.breakingLoadKn !== null && !input.breakingLoadFromCertificate) {
      errors.breakingLoadKn = [
        'A breaking load of your own needs its certificate. Say that it comes from there, or leave it to the table.',
      ];
    } else if (!breakingLoadOf(construction, input.diameterMm, input.breakingLoadKn)) {
      errors.breakingLoadKn = [
        'The table has no such diameter. Enter the breaking load of the certificate, or choose a listed diameter.',
      ];
    }
    if (input.breakingLoadFromCertificate && input.breakingLoadKn === null) {
      errors.breakingLoadKn = ['Enter the breaking load the certificate states.'];
    }
    if (input.fittedOn !== null) {
      const before: { removed_on: string | null }[] = await this.em.execute(
        `select max(removed_on)::text as removed_on from fitted_part
          where position_id = ? and removed_on is not null and (?::uuid is null or id <> ?::uuid)`,
        [positionId, partId, partId],
      );
      const { removed_on: removedOn } = before[0];
      if (input.fittedOn > this.clock.todayIn(vessel.zone)) {
        errors.fittedOn = ['This day is still to come.'];
      } else if (removedOn !== null && input.fittedOn < removedOn) {
        errors.fittedOn = [`The part before it was taken off on ${removedOn}; give that day or a later one.`];
      }
    }
    if (Object.keys(errors).length > 0) throw new InvalidRequestError(errors);
  }

  private async lock(
    me: Principal,
    partId: string,
    version: number,
  ): Promise<{ part: FittedPart; vessel: Vessel }> {
    const { vessel } = await this.reach.partOrFail(me, partId, 'rig:update');
    const part = await this.em.findOneOrFail(
      FittedPart,
      { id: partId },
      { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
    );
    if (part.version !== version) throw new VersionConflictError(await this.toDto(part, vessel));
    return { part, vessel };
  }

  private async toDto(part: FittedPart, vessel: Vessel): Promise<FittedPartDto> {
    return toFittedPartDto({
      part,
      position: await this.em.findOneOrFail(Position, { id: part.position }),
      construction: await this.constructions.version(part.construction),
      details: await this.em.find(
        PartDetail,
        { fittedPart: part.id },
        { orderBy: { createdAt: 'asc', id: 'asc' } },
      ),
      standing: await this.em.findOne(PartStanding, { fittedPart: part.id }, { refresh: true }),
      todayOn: this.clock.todayIn(vessel.zone),
    });
  }
}

function found(construction: ConstructionDto | null): ConstructionDto {
  if (!construction) throw new Error('A checked part has a construction');
  return construction;
}

function descriptionOf(part: FittedPart): Description {
  const fromCertificate = part.breakingLoadSource === 'certificate';
  return {
    constructionId: part.construction[0],
    diameterMm: part.diameterMm,
    breakingLoadKn: fromCertificate ? part.breakingLoadKn : null,
    breakingLoadFromCertificate: fromCertificate,
    lengthM: part.lengthM,
    upperTerminal: part.upperTerminal,
    lowerTerminal: part.lowerTerminal,
    threadSize: part.threadSize,
    pinDiameterMm: part.pinDiameterMm,
    hardware: part.hardware,
    batch: part.batch,
    certificate: part.certificate,
    fittedOn: part.fittedOn,
    notes: part.notes,
  };
}

function columnsOf(input: Description, construction: ConstructionDto) {
  const strength = breakingLoadOf(construction, input.diameterMm, input.breakingLoadKn);
  if (!strength) throw new Error('A checked part has a breaking load');
  return {
    construction: [construction.id, construction.version] as [string, number],
    diameterMm: input.diameterMm,
    breakingLoadKn: strength.breakingLoadKn,
    breakingLoadSource: strength.source,
    metallicAreaMm2: areaOf(construction, input.diameterMm),
    lengthM: input.lengthM,
    upperTerminal: input.upperTerminal,
    lowerTerminal: input.lowerTerminal,
    threadSize: input.threadSize,
    pinDiameterMm: input.pinDiameterMm,
    hardware: input.hardware,
    batch: input.batch,
    certificate: input.certificate,
    fittedOn: input.fittedOn,
    notes: input.notes,
  };
}
