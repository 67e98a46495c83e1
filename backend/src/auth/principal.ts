import { createParamDecorator, type ExecutionContext } from '@nestjs/common';
import type { Preferences } from '@stayledger/shared/contracts/auth';
import type { Permission, Role } from '@stayledger/shared/permissions/permissions';
import type { Request } from 'express';
import { SignedOutError } from '../common/errors/app-error.js';
import type { Reach } from '../database/reach.js';

/** One role a person has, through a firm or (owners) through their own vessels. */
export interface Capacity {
  role: Role;
  firmId: string | null;
  firmName: string | null;
}

/** Who is asking: the person behind the session, as they stand at this request. */
export interface Principal {
  userId: string;
  name: string;
  email: string;
  preferences: Preferences;
  version: number;
  capacities: readonly Capacity[];
  /** The union over the capacities. Which vessels they apply to is another question (`VesselReach`). */
  permissions: ReadonlySet<Permission>;
}

declare global {
  // eslint-disable-next-line @typescript-eslint/no-namespace -- the only way to tell Express the type of req.user
  namespace Express {
    // eslint-disable-next-line @typescript-eslint/no-empty-object-type
    interface User extends Principal {}
  }
}

/** What the database shows to somebody: their own vessels and those of their firms. */
export function reachOf(principal: Principal | undefined): Reach {
  if (!principal) return { parties: [] };
  return { parties: partiesOf(principal.userId, principal.capacities), userId: principal.userId };
}

export function partiesOf(userId: string, capacities: readonly Capacity[]): string[] {
  const firms = capacities.flatMap(({ firmId }) => (firmId ? [`firm:${firmId}`] : []));
  return [`user:${userId}`, ...new Set(firms)];
}

/** The principal of an Express request behind the session middleware; throws `SignedOutError` without one. */
export function principalOf(request: Request): Principal {
  if (!request.user) throw new SignedOutError();
  return request.user;
}

/** Handler parameter: who is asking. */
export const Me = createParamDecorator((_data: unknown, context: ExecutionContext): Principal =>
  principalOf(context.switchToHttp().getRequest<Request>()),
);
