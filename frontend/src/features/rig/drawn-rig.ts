import type { PositionDto } from '@stayledger/shared/contracts/rig';
import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import type { PositionGeometry, RigGeometry } from '@stayledger/shared/rig/geometry';
import { suggestGeometry } from '@stayledger/shared/rig/templates/suggest-geometry';
import { suggestPositionGeometry } from '@stayledger/shared/rig/templates/suggest-position-geometry';
import { templateForRigType } from '@stayledger/shared/rig/templates/template-keys';

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

/** What was measured on a vessel: hull and masts, and the runs of positions by their id. */
export interface MeasuredRig {
  geometry: RigGeometry | null;
  runs: ReadonlyMap<string, PositionGeometry | null>;
}

const NOTHING_MEASURED: MeasuredRig = { geometry: null, runs: new Map() };

/** The rig as it can be drawn: what was measured, and the usual proportions of the type where nothing was. */
export function drawnRig(
  vessel: Pick<VesselDto, 'rigType' | 'lengthM'>,
  positions: readonly PositionDto[],
  measured: MeasuredRig = NOTHING_MEASURED,
): DrawnRig {
  const geometry =
    measured.geometry ?? suggestGeometry(templateForRigType(vessel.rigType), { lengthM: vessel.lengthM });
  const drawn: DrawnPosition[] = [];
  const notDrawn: PositionDto[] = [];
  for (const position of positions) {
    const run = measured.runs.get(position.id) ?? suggestPositionGeometry(position, geometry);
    if (run) drawn.push({ position, geometry: run });
    else notDrawn.push(position);
  }
  return { geometry, drawn, notDrawn, suggested: measured.geometry === null };
}
