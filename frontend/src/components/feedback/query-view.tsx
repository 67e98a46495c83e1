import type { UseQueryResult } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { ErrorState } from './error-state';
import { LoadingState } from './loading-state';
import { useRetryFailed } from './use-retry-failed';

/**
 * The three states of a query. A failed refresh keeps what was shown and says so above it: a stale figure with a
 * notice beats an empty page, and a figure without the notice would pass for a fresh one.
 */
export function QueryView<Data>({
  query,
  loadingLabel,
  children,
}: {
  query: UseQueryResult<Data, Error>;
  loadingLabel?: string;
  children: (data: Data) => ReactNode;
}) {
  const retryFailed = useRetryFailed();
  if (query.data !== undefined) {
    return (
      <>
        {query.isError ? (
          <ErrorState title="Not up to date" error={query.error} onRetry={retryFailed} retryLabel="Refresh" />
        ) : null}
        {children(query.data)}
      </>
    );
  }
  if (query.isError) return <ErrorState error={query.error} onRetry={retryFailed} />;
  return <LoadingState label={loadingLabel} />;
}
