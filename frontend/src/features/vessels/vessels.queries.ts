import { usagePlanReplySchema } from '@stayledger/shared/contracts/life';
import {
  vesselPageSchema,
  vesselSchema,
  type VesselListQuery,
  type VesselPageDto,
} from '@stayledger/shared/contracts/vessels';
import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import { apiGet } from '../../lib/api-client';

export type FleetFilter = Pick<VesselListQuery, 'q' | 'sort' | 'filter'>;

export const vesselQueries = {
  all: () => ['vessels'] as const,
  /** Pages of the fleet, fetched one after the other by keyset. */
  list: (filter: FleetFilter, limit = 50) =>
    infiniteQueryOptions({
      queryKey: [...vesselQueries.all(), 'list', filter, limit] as const,
      queryFn: ({ pageParam, signal }): Promise<VesselPageDto> =>
        apiGet('/vessels', vesselPageSchema, { query: { ...filter, limit, cursor: pageParam }, signal }),
      initialPageParam: undefined as string | undefined,
      getNextPageParam: (page) => page.nextCursor ?? undefined,
    }),
  /** A few vessels with work of one kind. */
  work: (filter: 'overdue' | 'due' | 'waiting') =>
    queryOptions({
      queryKey: [...vesselQueries.all(), 'work', filter] as const,
      queryFn: ({ signal }) =>
        apiGet('/vessels', vesselPageSchema, { query: { filter, sort: 'due', limit: 6 }, signal }),
    }),
  detail: (vesselId: string) =>
    queryOptions({
      queryKey: [...vesselQueries.all(), 'detail', vesselId] as const,
      queryFn: ({ signal }) => apiGet(`/vessels/${vesselId}`, vesselSchema, { signal }),
    }),
  usagePlan: (vesselId: string) =>
    queryOptions({
      queryKey: [...vesselQueries.all(), 'usage-plan', vesselId] as const,
      queryFn: ({ signal }) => apiGet(`/vessels/${vesselId}/usage-plan`, usagePlanReplySchema, { signal }),
    }),
};
