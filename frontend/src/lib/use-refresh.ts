import { useQueryClient } from '@tanstack/react-query';

/**
 * Marks everything fetched as old. A part, a plan or a posted log moves standings on nearly every page; guessing which
 * would one day leave a stale date on a screen.
 */
export function useRefresh(): () => Promise<void> {
  const queryClient = useQueryClient();
  return () =>
    queryClient.invalidateQueries({
      predicate: (query) => query.queryKey[0] !== 'session',
      refetchType: 'active',
    });
}
