import { preferencesSchema, type Preferences, type SessionDto } from '@stayledger/shared/contracts/auth';
import type { Permission, Role } from '@stayledger/shared/permissions/permissions';
import { useQueryClient } from '@tanstack/react-query';
import { createContext, useContext, useMemo, type ReactNode } from 'react';
import { sessionQueries } from './session.queries';

const SessionContext = createContext<SessionDto | null>(null);
const DEFAULT_PREFERENCES = preferencesSchema.parse({});

export interface SignedInSession {
  user: NonNullable<SessionDto['user']>;
  roles: SessionDto['roles'];
  permissions: readonly Permission[];
  hasRole: (...roles: Role[]) => boolean;
}

/** Makes the session of a signed-in person known to everything below. */
export function SessionProvider({ session, children }: { session: SessionDto; children: ReactNode }) {
  return <SessionContext.Provider value={session}>{children}</SessionContext.Provider>;
}

export function useSession(): SignedInSession {
  const session = useContext(SessionContext);
  return useMemo(() => {
    if (!session?.user) throw new Error('useSession stands outside SessionProvider.');
    return {
      user: session.user,
      roles: session.roles,
      permissions: session.permissions,
      hasRole: (...roles: Role[]) => session.roles.some((held) => roles.includes(held.role)),
    };
  }, [session]);
}

/** True when the signed-in person holds the permission in any capacity. On one vessel ask `vessel.permissions`. */
export function useCan(permission: Permission): boolean {
  return useSession().permissions.includes(permission);
}

/** Units and habits of the person; the defaults before anyone has signed in. */
export function usePreferences(): Preferences {
  return useContext(SessionContext)?.user?.preferences ?? DEFAULT_PREFERENCES;
}

/** Fetches the session anew, after something in it was changed. */
export function useRefreshSession(): () => Promise<void> {
  const queryClient = useQueryClient();
  return () => queryClient.invalidateQueries({ queryKey: sessionQueries.current().queryKey });
}
