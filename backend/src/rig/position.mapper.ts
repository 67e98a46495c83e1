import type { ConstructionDto } from '@stayledger/shared/contracts/constructions';
import type { PositionDto } from '@stayledger/shared/contracts/rig';
import { positionKind } from '@stayledger/shared/rig/positions';
import type { PartStanding } from '../life/part-standing.entity.js';
import { toPartStandingDto } from '../life/part-standing.mapper.js';
import type { FittedPart } from '../parts/fitted-part.entity.js';
import type { Position } from './position.entity.js';

export interface PartInPosition {
  part: FittedPart;
  construction: Pick<ConstructionDto, 'name' | 'kindOfWire'>;
  standing: PartStanding | null;
}

export function toPositionDto(
  position: Position,
  fitted: PartInPosition | null,
  todayOn: string,
): PositionDto {
  return {
    id: position.id,
    vesselId: position.vessel,
    kind: position.kind,
    side: position.side,
    label: position.label,
    mast: position.mast,
    alias: positionKind(position.kind)?.alias ?? null,
    version: position.version,
    part: fitted && {
      id: fitted.part.id,
      constructionName: fitted.construction.name,
      kindOfWire: fitted.construction.kindOfWire,
      diameterMm: fitted.part.diameterMm,
      breakingLoadKn: fitted.part.breakingLoadKn,
      fittedOn: fitted.part.fittedOn,
      standing: toPartStandingDto(fitted.standing, todayOn),
    },
  };
}
