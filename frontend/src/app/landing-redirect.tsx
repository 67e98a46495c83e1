import { Navigate } from 'react-router-dom';
import { useSession, type SignedInSession } from '../lib/session';
import { paths } from './paths';

/** Each role lands on what it came for; a person with several roles on the first of these. */
export function landingPath(session: Pick<SignedInSession, 'hasRole'>): string {
  if (session.hasRole('surveyor', 'rigger')) return paths.fleet.pattern;
  if (session.hasRole('owner')) return paths.myVessel.pattern;
  if (session.hasRole('insurer')) return paths.portfolio.pattern;
  if (session.hasRole('administrator')) return paths.administration.pattern;
  return paths.profile.pattern;
}

export function LandingRedirect() {
  return <Navigate to={landingPath(useSession())} replace />;
}
