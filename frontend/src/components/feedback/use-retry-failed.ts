import { useQueryClient } from '@tanstack/react-query';

/**
 * Asks again for everything on the page that failed. One outage fails several queries at once; a person who presses one
 * button expects the page back, not a part of it.
 */
export function useRetryFailed(): () => void {
  const client = useQueryClient();
  return () =>
    void client.refetchQueries({ type: 'active', predicate: (query) => query.state.status === 'error' });
}
