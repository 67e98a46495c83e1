import { z } from 'zod';
import { PERMISSIONS, ROLES } from '../permissions/permissions.js';
import { idSchema } from './values.js';

export const signInSchema = z.strictObject({
  email: z.string().trim().toLowerCase().min(3).max(320),
  password: z.string().min(1).max(1024),
});
export type SignInInput = z.infer<typeof signInSchema>;

export const FORCE_UNITS = ['kN', 'kgf', 'daN', 'lbf', 'tf'] as const;
const preferenceFields = {
  forceUnit: z.enum(FORCE_UNITS),
  lengthUnit: z.enum(['m', 'ft']),
  theme: z.enum(['system', 'light', 'dark']),
  decimalComma: z.boolean(),
};
export const preferencesSchema = z.object({
  forceUnit: preferenceFields.forceUnit.default('kN'),
  lengthUnit: preferenceFields.lengthUnit.default('m'),
  theme: preferenceFields.theme.default('system'),
  decimalComma: preferenceFields.decimalComma.default(false),
});
/** Some of the preferences. Made from fields without defaults: a default would fill in, and so reset, what is left out. */
export const preferencesChangeSchema = z.strictObject(preferenceFields).partial();
export type Preferences = z.infer<typeof preferencesSchema>;

/** Who is signed in, in which capacities, and what that allows. Permissions are the union over the roles. */
export const sessionSchema = z.object({
  signedIn: z.boolean(),
  user: z
    .object({
      id: idSchema,
      name: z.string(),
      email: z.string(),
      preferences: preferencesSchema,
      version: z.int(),
    })
    .nullable(),
  roles: z.array(
    z.object({ role: z.enum(ROLES), firmId: idSchema.nullable(), firmName: z.string().nullable() }),
  ),
  permissions: z.array(z.enum(PERMISSIONS)),
});
export type SessionDto = z.infer<typeof sessionSchema>;

/** Demo sign-ins, offered on the sign-in page only by a service that runs the demo on loopback. */
export const demoSignInsSchema = z.object({
  items: z.array(
    z.object({ email: z.string(), password: z.string(), role: z.enum(ROLES), name: z.string() }),
  ),
});
export type DemoSignInsDto = z.infer<typeof demoSignInsSchema>;
