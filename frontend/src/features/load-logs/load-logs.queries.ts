import {
  loadLogPageSchema,
  loadLogSchema,
  logReviewSchema,
  rememberedMappingsSchema,
  type LoadLogDto,
} from '@stayledger/shared/contracts/load-logs';
import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import { apiGet } from '../../lib/api-client';
import { loadLogStateWords } from './load-log-states';

const POLL_MS = 1000;
/** The list is glanced at, not watched: its moving rows are asked for less often. */
const LIST_POLL_MS = 3000;

/** How soon to ask again for a log the server works on; never for one that waits for a person. */
export function pollInterval(log: Pick<LoadLogDto, 'state'> | undefined): number | false {
  return log !== undefined && loadLogStateWords(log.state).moving ? POLL_MS : false;
}

export const loadLogQueries = {
  all: () => ['load-logs'] as const,
  ofVessel: (vesselId: string) =>
    infiniteQueryOptions({
      queryKey: [...loadLogQueries.all(), 'of-vessel', vesselId],
      queryFn: ({ pageParam, signal }) =>
        apiGet(`/vessels/${vesselId}/load-logs`, loadLogPageSchema, { query: { cursor: pageParam }, signal }),
      initialPageParam: null as string | null,
      getNextPageParam: (page) => page.nextCursor,
      refetchInterval: ({ state }) =>
        state.data?.pages.some((page) => page.items.some((log) => loadLogStateWords(log.state).moving))
          ? LIST_POLL_MS
          : false,
    }),
  detail: (loadLogId: string) =>
    queryOptions({
      queryKey: [...loadLogQueries.all(), 'detail', loadLogId],
      queryFn: ({ signal }) => apiGet(`/load-logs/${loadLogId}`, loadLogSchema, { signal }),
      refetchInterval: ({ state }) => pollInterval(state.data),
    }),
  /** What posting would change; the version in the key asks anew when the log was counted again. */
  review: (loadLogId: string, version: number) =>
    queryOptions({
      queryKey: [...loadLogQueries.all(), 'review', loadLogId, version],
      queryFn: ({ signal }) => apiGet(`/load-logs/${loadLogId}/review`, logReviewSchema, { signal }),
    }),
  remembered: (vesselId: string) =>
    queryOptions({
      queryKey: [...loadLogQueries.all(), 'remembered', vesselId],
      queryFn: ({ signal }) =>
        apiGet(`/vessels/${vesselId}/channel-mappings`, rememberedMappingsSchema, { signal }),
    }),
};
