import type { SignedInSession } from '../lib/session';
import { paths } from './paths';

export interface NavigationItem {
  label: string;
  to: string;
  /** Addresses that belong to the item besides its own. */
  also?: string[];
}

/** What stands in the header, by what the person may do. */
export function navigationFor(session: SignedInSession): NavigationItem[] {
  const may = (permission: SignedInSession['permissions'][number]) =>
    session.permissions.includes(permission);
  const items: (NavigationItem | false)[] = [
    session.hasRole('surveyor', 'rigger') && {
      label: 'Fleet',
      to: paths.fleet.pattern,
      also: ['/vessels', '/parts', '/load-logs'],
    },
    session.hasRole('owner') && { label: 'My vessel', to: paths.myVessel.pattern },
    may('portfolio:read') && { label: 'Portfolio', to: paths.portfolio.pattern },
    may('curves:read') && { label: 'Reference data', to: paths.reference.pattern },
    may('users:read') && { label: 'Administration', to: paths.administration.pattern },
    { label: 'Help', to: paths.help.pattern },
  ];
  return items.filter((item) => item !== false);
}
