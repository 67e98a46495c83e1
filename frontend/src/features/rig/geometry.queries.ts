import { drawnRigSchema, type DrawnRigDto, type SaveGeometryInput } from '@stayledger/shared/contracts/rig';
import { queryOptions } from '@tanstack/react-query';
import { apiGet, apiSend } from '../../lib/api-client';
import type { MeasuredRig } from './drawn-rig';

export const geometryQueries = {
  ofVessel: (vesselId: string) =>
    queryOptions({
      queryKey: ['rig', vesselId, 'geometry'] as const,
      queryFn: ({ signal }) => apiGet(`/vessels/${vesselId}/rig/geometry`, drawnRigSchema, { signal }),
    }),
};

export function saveGeometry(vesselId: string, input: SaveGeometryInput) {
  return apiSend('PUT', `/vessels/${vesselId}/rig/geometry`, drawnRigSchema, { body: input });
}

/** What the server knows of the rig's geometry, as the elevation takes it. */
export function measuredRig(drawn: DrawnRigDto | undefined): MeasuredRig | undefined {
  if (!drawn) return undefined;
  return {
    geometry: drawn.source === 'entered' ? drawn.geometry : null,
    runs: new Map(drawn.positions.map(({ positionId, geometry }) => [positionId, geometry])),
  };
}
