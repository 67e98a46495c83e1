import { constructionListSchema } from '@stayledger/shared/contracts/constructions';
import { curveListSchema, listedCurveSchema } from '@stayledger/shared/contracts/curves';
import { queryOptions } from '@tanstack/react-query';
import { apiGet } from '../../lib/api-client';

/** Reference data are versioned and never change in place, so one fetch serves a visit. */
const KEPT_MS = 30 * 60_000;

export const referenceQueries = {
  constructions: () =>
    queryOptions({
      queryKey: ['reference', 'constructions'] as const,
      queryFn: ({ signal }) => apiGet('/constructions', constructionListSchema, { signal }),
      staleTime: KEPT_MS,
    }),
  curves: () =>
    queryOptions({
      queryKey: ['reference', 'curves'] as const,
      queryFn: ({ signal }) => apiGet('/curves', curveListSchema, { signal }),
      staleTime: KEPT_MS,
    }),
  curve: (curveId: string) =>
    queryOptions({
      queryKey: ['reference', 'curves', curveId] as const,
      queryFn: ({ signal }) =>
        apiGet(`/curves/${encodeURIComponent(curveId)}`, listedCurveSchema, { signal }),
      staleTime: KEPT_MS,
    }),
};
