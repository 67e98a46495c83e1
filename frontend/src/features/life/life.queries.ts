import { partLifeSchema } from '@stayledger/shared/contracts/life';
import { queryOptions } from '@tanstack/react-query';
import { apiGet } from '../../lib/api-client';

export const lifeQueries = {
  ofPart: (partId: string) =>
    queryOptions({
      queryKey: ['life', partId],
      queryFn: ({ signal }) => apiGet(`/parts/${partId}/life`, partLifeSchema, { signal }),
    }),
};
