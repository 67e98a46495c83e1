import { detailChoicesSchema } from '@stayledger/shared/contracts/detail-choices';
import { queryOptions } from '@tanstack/react-query';
import { apiGet } from '../../lib/api-client';

export const detailChoiceQueries = {
  ofPart: (partId: string) =>
    queryOptions({
      queryKey: ['detail-choices', partId] as const,
      queryFn: ({ signal }) => apiGet(`/parts/${partId}/detail-choices`, detailChoicesSchema, { signal }),
    }),
};
