import { rerigScheduleSchema, type RerigScheduleDto } from '@stayledger/shared/contracts/rerig-schedules';
import { yardTermsReplySchema } from '@stayledger/shared/contracts/yard-terms';
import { queryOptions } from '@tanstack/react-query';
import { apiGet, apiUrl } from '../../lib/api-client';

const LOOK_AGAIN_MS = 1000;

/** A plan that was asked for and is neither made nor given up. */
export function isPlanning({ planning }: Pick<RerigScheduleDto, 'planning'>): boolean {
  return planning?.state === 'queued' || planning?.state === 'running';
}

export const rerigQueries = {
  all: () => ['rerig-schedules'] as const,
  ofVessel: (vesselId: string) =>
    queryOptions({
      queryKey: [...rerigQueries.all(), vesselId] as const,
      queryFn: ({ signal }) => apiGet(`/vessels/${vesselId}/rerig-schedule`, rerigScheduleSchema, { signal }),
      refetchInterval: ({ state }) => (state.data && isPlanning(state.data) ? LOOK_AGAIN_MS : false),
    }),
  yardTerms: () =>
    queryOptions({
      queryKey: ['yard-terms'] as const,
      queryFn: ({ signal }) => apiGet('/yard-terms', yardTermsReplySchema, { signal }),
    }),
};

/** Where the calendar file of a vessel is. */
export function calendarUrl(vesselId: string): string {
  return apiUrl(`/vessels/${vesselId}/rerig-schedule/calendar`);
}
