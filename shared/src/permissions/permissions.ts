/** Who comes to the product and for what (see DEVELOPERS.md, glossary). */
export const ROLES = ['surveyor', 'rigger', 'owner', 'insurer', 'administrator'] as const;
export type Role = (typeof ROLES)[number];

/** Every permission of the service. A route names exactly one; a button asks the same table. */
export const PERMISSIONS = [
  'vessels:read',
  'vessels:register',
  'vessels:update',
  'rig:update',
  'load-logs:read',
  'load-logs:upload',
  'load-logs:post',
  'ledger:read',
  'ledger:check',
  'life:read',
  'usage:state',
  'rerig:read',
  'rerig:plan',
  'rerig:accept',
  'curves:read',
  'curves:add',
  'portfolio:read',
  'users:read',
  'firms:read',
  'jobs:administer',
  'audit:read',
  'profile:update',
] as const;
export type Permission = (typeof PERMISSIONS)[number];

const looksAfterVessels: Permission[] = [
  'vessels:read',
  'vessels:register',
  'vessels:update',
  'rig:update',
  'load-logs:read',
  'load-logs:upload',
  'load-logs:post',
  'ledger:read',
  'ledger:check',
  'life:read',
  'usage:state',
  'rerig:read',
  'rerig:plan',
  'curves:read',
  'curves:add',
  'audit:read',
  'profile:update',
];

/**
 * What a role may do. *Which* vessels it may do it to is decided by `vessel_access` alone, never here.
 * Signing reports, the one thing that sets surveyor and rigger apart, comes with the reports.
 */
export const ROLE_PERMISSIONS: Readonly<Record<Role, readonly Permission[]>> = {
  surveyor: looksAfterVessels,
  rigger: looksAfterVessels,
  owner: [
    'vessels:read',
    'load-logs:read',
    'load-logs:upload',
    'ledger:read',
    'life:read',
    'usage:state',
    'rerig:read',
    'rerig:accept',
    'curves:read',
    'profile:update',
  ],
  insurer: ['portfolio:read', 'curves:read', 'profile:update'],
  administrator: ['users:read', 'firms:read', 'jobs:administer', 'audit:read', 'profile:update'],
};

/** True when the role's row of the table holds the permission. */
export function can(role: Role, permission: Permission): boolean {
  return ROLE_PERMISSIONS[role].includes(permission);
}
