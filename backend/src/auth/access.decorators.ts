import { applyDecorators, SetMetadata } from '@nestjs/common';
import { ApiExtension } from '@nestjs/swagger';
import type { Permission } from '@stayledger/shared/permissions/permissions';

export const ACCESS = 'stayledger:access';
/** What a route asks of the person. A route that says nothing is closed to everybody. */
export type Access = 'public' | 'signed-in' | Permission;

function access(rule: Access): MethodDecorator {
  // The OpenAPI document repeats it: the matrix of routes and roles in the tests is made from there.
  return applyDecorators(SetMetadata(ACCESS, rule), ApiExtension('x-access', rule));
}

/** Open to everybody, signed in or not. */
export const Public = () => access('public');

/** Open to whoever is signed in, whatever their role: things that concern only themselves. */
export const SignedIn = () => access('signed-in');

/** Open to those with this permission in any capacity. Routes about one vessel ask `VesselReach` as well. */
export const RequirePermission = (permission: Permission) => access(permission);
