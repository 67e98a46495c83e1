import { ledgerPageSchema } from '@stayledger/shared/contracts/ledger';
import { infiniteQueryOptions } from '@tanstack/react-query';
import { apiGet } from '../../lib/api-client';

export const ledgerQueries = {
  ofPart: (partId: string) =>
    infiniteQueryOptions({
      queryKey: ['ledger', partId],
      queryFn: ({ pageParam, signal }) =>
        apiGet(`/parts/${partId}/ledger`, ledgerPageSchema, {
          query: { cursor: pageParam, limit: 50 },
          signal,
        }),
      initialPageParam: null as string | null,
      getNextPageParam: (page) => page.nextCursor,
    }),
};
