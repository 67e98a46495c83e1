import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { ApplyTemplateInput, DrawnRigDto, saveGeometrySchema } from '@stayledger/shared/contracts/rig';
import { stayLengthM, type PositionGeometry, type RigGeometry } from '@stayledger/shared/rig/geometry';
import { rigTemplate } from '@stayledger/shared/rig/templates/rig-template';
import { suggestGeometry } from '@stayledger/shared/rig/templates/suggest-geometry';
import { suggestPositionGeometry } from '@stayledger/shared/rig/templates/suggest-position-geometry';
import { templateForRigType } from '@stayledger/shared/rig/templates/template-keys';
import type { z } from 'zod';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { InvalidRequestError, VersionConflictError } from '../common/errors/app-error.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { Position } from './position.entity.js';
import { RigGeometryRow } from './rig-geometry.entity.js';
import { RigService } from './rig.service.js';

type SaveInput = z.output<typeof saveGeometrySchema>;

/** Kinds a discontinuous rig has: where one of them stands, the cap shroud ends at the first spreader. */
const DISCONTINUOUS = ['vertical-2', 'vertical-3'];

/** Where masts and stays stand: as entered, and for the rest as usual for the rig type. */
@Injectable()
export class RigGeometryService {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
    private readonly reach: VesselReach,
    private readonly rigs: RigService,
    private readonly audit: AuditService,
  ) {}

  async drawn(me: Principal, vesselId: string): Promise<DrawnRigDto> {
    return this.drawnOf(await this.reach.findOrFail(me, vesselId, 'vessels:read'));
  }

  async save(me: Principal, vesselId: string, input: SaveInput): Promise<DrawnRigDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'rig:update');
    checkMasts(input.geometry);
    await this.em.execute('select 1 from vessel where id = ? for update', [vessel.id]);
    const stored = await this.em.findOne(RigGeometryRow, { vessel: vessel.id }, { refresh: true });
    if ((stored?.version ?? null) !== input.version) {
      throw new VersionConflictError(await this.drawnOf(vessel));
    }
    await this.store(vessel.id, stored, input.geometry);
    const now = this.clock.now();
    for (const { positionId, geometry } of input.positions) {
      const position = await this.em.findOne(Position, {
        id: positionId,
        vessel: vessel.id,
        archivedAt: null,
      });
      if (!position) {
        throw new InvalidRequestError({
          positions: ['One of these places is no longer on the rig. Reload.'],
        });
      }
      this.em.assign(position, { geometry, updatedAt: now });
    }
    await this.em.flush();
    await this.audit.record(this.em, {
      action: 'rig.geometry-saved',
      subjectKind: 'vessel',
      subjectId: vessel.id,
      userId: me.userId,
      vesselId: vessel.id,
      data: { masts: input.geometry.masts.length, positions: input.positions.length },
    });
    return this.drawnOf(vessel);
  }

  /** Adds what a rig of the type has and this one lacks. A geometry somebody entered is kept. */
  async applyTemplate(me: Principal, vesselId: string, input: ApplyTemplateInput): Promise<void> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'rig:update');
    const template = rigTemplate(input.template, { lengthM: vessel.lengthM, spreaders: input.spreaders });
    await this.em.execute('select 1 from vessel where id = ? for update', [vessel.id]);
    if (!(await this.em.findOne(RigGeometryRow, { vessel: vessel.id }))) {
      await this.store(vessel.id, null, template.geometry);
    }
    const there = await this.em.find(Position, { vessel: vessel.id, archivedAt: null });
    for (const { kind, side, mast } of template.positions) {
      const known = there.some(
        (position) => position.kind === kind && position.side === side && position.mast === mast,
      );
      if (!known) await this.rigs.addPosition(me, vessel.id, { kind, side, mast });
    }
  }

  private async store(vesselId: string, stored: RigGeometryRow | null, data: RigGeometry): Promise<void> {
    const now = this.clock.now();
    if (stored) {
      this.em.assign(stored, { data, updatedAt: now, version: stored.version + 1 });
    } else {
      this.em.persist(
        this.em.create(RigGeometryRow, {
          vessel: vesselId,
          data,
          createdAt: now,
          updatedAt: now,
          version: 1,
        }),
      );
    }
    await this.em.flush();
  }

  private async drawnOf(vessel: Vessel): Promise<DrawnRigDto> {
    const stored = await this.em.findOne(RigGeometryRow, { vessel: vessel.id });
    const positions = await this.em.find(
      Position,
      { vessel: vessel.id, archivedAt: null },
      { orderBy: { sortOrder: 'asc', label: 'asc', id: 'asc' } },
    );
    const geometry =
      stored?.data ?? suggestGeometry(templateForRigType(vessel.rigType), { lengthM: vessel.lengthM });
    const discontinuousMasts = new Set(
      positions.filter(({ kind }) => DISCONTINUOUS.includes(kind)).map(({ mast }) => mast),
    );
    return {
      source: stored ? 'entered' : 'suggested',
      geometry,
      version: stored?.version ?? null,
      positions: positions.map((position) => {
        const entered = position.geometry as PositionGeometry | null;
        const { kind, side, mast } = position;
        const run =
          entered ??
          suggestPositionGeometry(
            { kind, side, mast, discontinuous: discontinuousMasts.has(mast) },
            geometry,
          );
        return {
          positionId: position.id,
          source: entered ? 'entered' : 'suggested',
          geometry: run,
          lengthM: run && Math.round(stayLengthM(run) * 100) / 100,
        };
      }),
    };
  }
}

function checkMasts({ masts }: RigGeometry): void {
  const keys = masts.map(({ key }) => key);
  if (new Set(keys).size < keys.length) {
    throw new InvalidRequestError({ geometry: ['Two masts have the same name.'] });
  }
}
