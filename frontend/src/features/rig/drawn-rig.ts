import type { DrawnRigDto, PositionDto } from '@stayledger/shared/contracts/rig';
import type { PositionGeometry, RigGeometry } from '@stayledger/shared/rig/geometry';

export interface DrawnPosition {
  position: PositionDto;
  geometry: PositionGeometry;
}

export interface DrawnRig {
  geometry: RigGeometry;
  /** In rig order. */
  drawn: DrawnPosition[];
  /** Places without a run: running rigging, masts nobody described. */
  notDrawn: PositionDto[];
  /** True where nobody measured: the proportions are those usual for the type. */
  suggested: boolean;
}

/** The positions of a rig sorted into what can be drawn and what cannot. */
export function drawnRig(
  { source, geometry, positions }: DrawnRigDto,
  rig: readonly PositionDto[],
): DrawnRig {
  const runs = new Map(positions.map(({ positionId, geometry: run }) => [positionId, run]));
  const drawn: DrawnPosition[] = [];
  const notDrawn: PositionDto[] = [];
  for (const position of rig) {
    const run = runs.get(position.id);
    if (run) drawn.push({ position, geometry: run });
    else notDrawn.push(position);
  }
  return { geometry, drawn, notDrawn, suggested: source === 'suggested' };
}
