import { useQuery } from '@tanstack/react-query';
import { useEffect } from 'react';
import { Navigate, Outlet, useLocation } from 'react-router-dom';
import { ErrorState } from '../components/feedback/error-state';
import { LoadingState } from '../components/feedback/loading-state';
import { sessionQueries } from '../lib/session.queries';
import { SessionProvider } from '../lib/session';
import { useColourMode } from '../theme/colour-mode';
import { paths } from './paths';

/** Lets signed-in people through and sends everyone else to the sign-in page, with the way back remembered. */
export function SignedInGate() {
  const session = useQuery(sessionQueries.current());
  const location = useLocation();
  const { choice, choose } = useColourMode();
  const preferred = session.data?.user?.preferences.theme;

  useEffect(() => {
    if (preferred && preferred !== choice) choose(preferred);
    // Only a change of the stored preference moves the theme; the person's own switch is stored by the profile page.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [preferred]);

  if (session.isPending) return <LoadingState label="Opening Stayledger" />;
  if (session.isError) return <ErrorState error={session.error} onRetry={() => void session.refetch()} />;
  if (!session.data.signedIn || !session.data.user) {
    const from = `${location.pathname}${location.search}`;
    return <Navigate to={paths.signIn.to(from === paths.home.pattern ? undefined : from)} replace />;
  }
  return (
    <SessionProvider session={session.data}>
      <Outlet />
    </SessionProvider>
  );
}
