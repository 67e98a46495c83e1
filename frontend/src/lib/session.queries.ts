import { demoSignInsSchema, sessionSchema } from '@stayledger/shared/contracts/auth';
import { queryOptions } from '@tanstack/react-query';
import { apiGet } from './api-client';

export const sessionQueries = {
  current: () =>
    queryOptions({
      queryKey: ['session'],
      queryFn: ({ signal }) => apiGet('/auth/session', sessionSchema, { signal }),
      staleTime: 60_000,
    }),
  demoSignIns: () =>
    queryOptions({
      queryKey: ['demo-sign-ins'],
      queryFn: ({ signal }) => apiGet('/auth/demo-sign-ins', demoSignInsSchema, { signal }),
      staleTime: Infinity,
    }),
};
