import { curveSpreadSchema } from '@stayledger/shared/contracts/curve-spread';
import { queryOptions } from '@tanstack/react-query';
import { apiGet } from '../../lib/api-client';

export const curveSpreadQueries = {
  ofPart: (partId: string) =>
    queryOptions({
      queryKey: ['curve-spread', partId] as const,
      queryFn: ({ signal }) => apiGet(`/parts/${partId}/curve-spread`, curveSpreadSchema, { signal }),
    }),
};
