import { positionHistorySchema } from '@stayledger/shared/contracts/position-history';
import { queryOptions } from '@tanstack/react-query';
import { apiGet } from '../../lib/api-client';

export const positionHistoryQueries = {
  of: (positionId: string) =>
    queryOptions({
      queryKey: ['position-history', positionId] as const,
      queryFn: ({ signal }) => apiGet(`/positions/${positionId}/history`, positionHistorySchema, { signal }),
    }),
};
