import { isRouteErrorResponse, useRouteError } from 'react-router-dom';
import { ErrorState } from '../components/feedback/error-state';
import { NotFoundPage } from '../pages/not-found/not-found.page';

/** What stands where a page failed to load or to draw itself. */
export function RouteErrorPage() {
  const error = useRouteError();
  if (isRouteErrorResponse(error) && error.status === 404) return <NotFoundPage />;
  const chunkMissing =
    error instanceof Error && /dynamically imported module|module script|preload/i.test(error.message);
  if (chunkMissing) {
    return (
      <ErrorState
        title="This page could not be loaded"
        error={new Error('Stayledger may have been renewed, or the connection broke. Load the page again.')}
        onRetry={() => window.location.reload()}
        retryLabel="Load again"
      />
    );
  }
  return (
    <ErrorState
      title="This page failed"
      error={error}
      onRetry={() => window.location.reload()}
      retryLabel="Load again"
    />
  );
}
