import type { SessionDto } from '@stayledger/shared/contracts/auth';
import type { Principal } from './principal.js';

export function toSession(principal: Principal | undefined): SessionDto {
  if (!principal) return { signedIn: false, user: null, roles: [], permissions: [] };
  return {
    signedIn: true,
    user: {
      id: principal.userId,
      name: principal.name,
      email: principal.email,
      preferences: principal.preferences,
      version: principal.version,
    },
    roles: principal.capacities.map(({ role, firmId, firmName }) => ({ role, firmId, firmName })),
    permissions: [...principal.permissions],
  };
}
