import { MutationCache, QueryCache, QueryClient } from '@tanstack/react-query';
import { ApiError, isApiError, UnreachableError } from './api-error';
import { sessionQueries } from './session.queries';

/** One cache for the application. A session that ended elsewhere sends everyone to the sign-in page. */
export function createQueryClient(): QueryClient {
  const noticeSignedOut = (error: unknown) => {
    if (isApiError(error, 'signed-out')) {
      void client.invalidateQueries({ queryKey: sessionQueries.current().queryKey });
    }
  };
  const client: QueryClient = new QueryClient({
    queryCache: new QueryCache({ onError: noticeSignedOut }),
    mutationCache: new MutationCache({ onError: noticeSignedOut }),
    defaultOptions: {
      queries: {
        staleTime: 10_000,
        refetchOnWindowFocus: true,
        // Only what may pass by itself is tried again: no connection, or a server that is starting.
        retry: (failures, error) =>
          failures < 2 &&
          (error instanceof UnreachableError || (error instanceof ApiError && error.status >= 500)),
      },
      mutations: { retry: false },
    },
  });
  return client;
}
