import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import { fitPartSchema } from '@stayledger/shared/contracts/parts';
import {
  createVesselSchema,
  type CreateSisterInput,
  type VesselDto,
} from '@stayledger/shared/contracts/vessels';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { PartsService } from '../parts/parts.service.js';
import { Position } from '../rig/position.entity.js';
import { RigGeometryRow } from '../rig/rig-geometry.entity.js';
import { RigService } from '../rig/rig.service.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { VesselsService } from '../vessels/vessels.service.js';

/** A vessel as the start of a sister vessel. */
@Injectable()
export class SistersService {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
    private readonly reach: VesselReach,
    private readonly vessels: VesselsService,
    private readonly rigs: RigService,
    private readonly parts: PartsService,
  ) {}

  /**
   * Copies the description of the vessel and her rig. Papers, batches, fitting days and accounts belong to one vessel
   * alone: a copied part is of unknown age and takes its strength from the table.
   */
  async create(me: Principal, vesselId: string, { name, withParts }: CreateSisterInput): Promise<VesselDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'vessels:read');
    const { rigType, zone, buildYear, lengthM, homePort, useKind } = vessel;
    const mine = me.capacities.some(({ firmId }) => firmId === vessel.firm);
    const sister = await this.vessels.register(
      me,
      createVesselSchema.parse({
        name,
        rigType,
        zone,
        buildYear,
        lengthM,
        homePort,
        useKind,
        ...(mine ? { firmId: vessel.firm } : {}),
      }),
    );
    const now = this.clock.now();
    const drawn = await this.em.findOne(RigGeometryRow, { vessel: vessel.id });
    if (drawn) {
      this.em.persist(
        this.em.create(RigGeometryRow, {
          vessel: sister.id,
          data: drawn.data,
          createdAt: now,
          updatedAt: now,
          version: 1,
        }),
      );
    }
    const positions = await this.em.find(
      Position,
      { vessel: vessel.id, archivedAt: null },
      { orderBy: { sortOrder: 'asc', label: 'asc', id: 'asc' } },
    );
    const fitted = await this.em.find(FittedPart, { vessel: vessel.id, removedOn: null });
    for (const position of positions) {
      const { kind, side, mast, label } = position;
      const copy = await this.rigs.addPosition(me, sister.id, { kind, side, mast, label });
      if (position.geometry !== null) {
        const row = await this.em.findOneOrFail(Position, { id: copy.id });
        this.em.assign(row, { geometry: position.geometry, updatedAt: now });
        await this.em.flush();
      }
      const part = fitted.find((candidate) => candidate.position === position.id);
      if (part && withParts) await this.parts.fit(me, copy.id, descriptionFor(part));
    }
    await this.em.flush();
    return sister;
  }
}

function descriptionFor(part: FittedPart) {
  return fitPartSchema.parse({
    constructionId: part.construction[0],
    diameterMm: part.diameterMm,
    // A diameter outside the table has no other strength than its certificate's; the paper itself is not hers.
    ...(part.breakingLoadSource === 'certificate'
      ? { breakingLoadKn: part.breakingLoadKn, breakingLoadFromCertificate: true }
      : {}),
    lengthM: part.lengthM,
    upperTerminal: part.upperTerminal,
    lowerTerminal: part.lowerTerminal,
    threadSize: part.threadSize,
    pinDiameterMm: part.pinDiameterMm,
    hardware: part.hardware,
  });
}
