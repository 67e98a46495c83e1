import type { ConstructionDto } from '@stayledger/shared/contracts/constructions';
import type { FittedPartDto, PartDetailDto } from '@stayledger/shared/contracts/parts';
import { positionKind } from '@stayledger/shared/rig/positions';
import type { PartDetail } from '../life/part-detail.entity.js';
import type { PartStanding } from '../life/part-standing.entity.js';
import { toPartStandingDto } from '../life/part-standing.mapper.js';
import type { Position } from '../rig/position.entity.js';
import type { FittedPart } from './fitted-part.entity.js';
import { assemblyOf } from './part-strength.js';

export interface PartWithContext {
  part: FittedPart;
  position: Position;
  construction: ConstructionDto;
  details: readonly PartDetail[];
  standing: PartStanding | null;
  todayOn: string;
}

export function toFittedPartDto(context: PartWithContext): FittedPartDto {
  const { part, position, construction } = context;
  const { breakingLoadKn, weakestElement, unknownElements } = assemblyOf(part);
  return {
    id: part.id,
    vesselId: part.vessel,
    positionId: part.position,
    positionLabel: position.label,
    positionAlias: positionKind(position.kind)?.alias ?? null,
    constructionId: part.construction[0],
    constructionVersion: part.construction[1],
    constructionName: construction.name,
    kindOfWire: construction.kindOfWire,
    diameterMm: part.diameterMm,
    breakingLoadKn: part.breakingLoadKn,
    breakingLoadSource: part.breakingLoadSource,
    breakingLoadFromCertificate: part.breakingLoadSource === 'certificate',
    metallicAreaMm2: part.metallicAreaMm2,
    assembly: { breakingLoadKn, weakestElement, unknownElements },
    lengthM: part.lengthM,
    upperTerminal: part.upperTerminal,
    lowerTerminal: part.lowerTerminal,
    threadSize: part.threadSize,
    pinDiameterMm: part.pinDiameterMm,
    hardware: part.hardware,
    batch: part.batch,
    certificate: part.certificate,
    fittedOn: part.fittedOn,
    removedOn: part.removedOn,
    removedReason: part.removedReason,
    notes: part.notes,
    standing: toPartStandingDto(context.standing, context.todayOn),
    details: context.details.map(toPartDetailDto),
    createdAt: part.createdAt.toISOString(),
    version: part.version,
  };
}

function toPartDetailDto(detail: PartDetail): PartDetailDto {
  return {
    id: detail.id,
    key: detail.key,
    name: detail.name,
    kind: detail.kind,
    curveId: detail.curve?.[0] ?? null,
    curveVersion: detail.curve?.[1] ?? null,
    designFatigueFactor: detail.designFatigueFactor,
    factor: detail.model.inputs?.factor ?? null,
    explanation: detail.explanation,
    estimates: detail.estimates,
  };
}
