import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { PositionHistoryDto } from '@stayledger/shared/contracts/position-history';
import { positionKind } from '@stayledger/shared/rig/positions';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { ConstructionsService } from '../constructions/constructions.service.js';
import { PartStanding } from '../life/part-standing.entity.js';
import { toPartStandingDto } from '../life/part-standing.mapper.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';

/** What has been in a place on the rig, through time. */
@Injectable()
export class PositionHistoryService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
    private readonly constructions: ConstructionsService,
    private readonly clock: Clock,
  ) {}

  /** Every part the position has had, the one in place first, then by the day it came off. */
  async of(me: Principal, positionId: string): Promise<PositionHistoryDto> {
    const { position, vessel } = await this.reach.positionOrFail(me, positionId, 'life:read');
    const parts = await this.em.find(FittedPart, { position: position.id });
    const ids = parts.map(({ id }) => id);
    const standings = await this.em.find(PartStanding, { fittedPart: { $in: ids } }, { refresh: true });
    const names = await this.constructions.namesOf(parts.map(({ construction }) => construction));
    const counts = await this.em.execute<{ part: string; entries: number }[]>(
      `select fitted_part_id as part, count(*)::int as entries from ledger_entry
        where fitted_part_id = any (array[?]::uuid[]) group by fitted_part_id`,
      [ids],
    );
    const todayOn = this.clock.todayIn(vessel.zone);
    return {
      positionId: position.id,
      vesselId: vessel.id,
      vesselName: vessel.name,
      zone: vessel.zone,
      label: position.label,
      alias: positionKind(position.kind)?.alias ?? null,
      parts: [...parts].sort(newestFirst).map((part) => {
        const construction = names.get(part.construction.join('@'));
        if (!construction) throw new Error(`Part ${part.id} lacks its construction`);
        return {
          id: part.id,
          constructionName: construction.name,
          kindOfWire: construction.kindOfWire,
          diameterMm: part.diameterMm,
          breakingLoadKn: part.breakingLoadKn,
          batch: part.batch,
          fittedOn: part.fittedOn,
          removedOn: part.removedOn,
          removedReason: part.removedReason,
          entries: counts.find((row) => row.part === part.id)?.entries ?? 0,
          standing: toPartStandingDto(
            standings.find(({ fittedPart }) => fittedPart === part.id) ?? null,
            todayOn,
          ),
        };
      }),
    };
  }
}

function newestFirst(a: FittedPart, b: FittedPart): number {
  const [endA, endB] = [a.removedOn ?? '9999-12-31', b.removedOn ?? '9999-12-31'];
  if (endA !== endB) return endA < endB ? 1 : -1;
  // Two that came off on one day: the later entered one was there last. Ids made later sort later.
  return a.id < b.id ? 1 : -1;
}
