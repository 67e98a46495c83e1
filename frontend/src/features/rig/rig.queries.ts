import { fittedPartSchema } from '@stayledger/shared/contracts/parts';
import { rigSchema } from '@stayledger/shared/contracts/rig';
import { queryOptions } from '@tanstack/react-query';
import { apiGet } from '../../lib/api-client';

export const rigQueries = {
  all: () => ['rig'] as const,
  ofVessel: (vesselId: string) =>
    queryOptions({
      queryKey: [...rigQueries.all(), vesselId] as const,
      queryFn: ({ signal }) => apiGet(`/vessels/${vesselId}/rig`, rigSchema, { signal }),
    }),
  part: (partId: string) =>
    queryOptions({
      queryKey: [...rigQueries.all(), 'part', partId] as const,
      queryFn: ({ signal }) => apiGet(`/parts/${partId}`, fittedPartSchema, { signal }),
    }),
};
