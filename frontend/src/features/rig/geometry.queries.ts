import { drawnRigSchema, type SaveGeometryInput } from '@stayledger/shared/contracts/rig';
import { queryOptions } from '@tanstack/react-query';
import { apiGet, apiSend } from '../../lib/api-client';

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
