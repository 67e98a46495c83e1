import { z } from 'zod';
import { ROLES } from '../permissions/permissions.js';
import { preferencesChangeSchema } from './auth.js';
import { pageOf } from './pagination.js';
import { idSchema, instantSchema, versionSchema } from './values.js';

export const userSchema = z.object({
  id: idSchema,
  name: z.string(),
  email: z.string(),
  active: z.boolean(),
  memberships: z.array(z.object({ role: z.enum(ROLES), firmId: idSchema, firmName: z.string() })),
  createdAt: instantSchema,
});
export type UserDto = z.infer<typeof userSchema>;
export const userPageSchema = pageOf(userSchema);

export const updateProfileSchema = z.strictObject({
  version: versionSchema,
  name: z.string().trim().min(1).max(120).optional(),
  preferences: preferencesChangeSchema.optional(),
});
export type UpdateProfileInput = z.infer<typeof updateProfileSchema>;

export const changePasswordSchema = z.strictObject({
  currentPassword: z.string().min(1).max(1024),
  newPassword: z.string().min(12, 'Use at least 12 characters.').max(1024),
});
export type ChangePasswordInput = z.infer<typeof changePasswordSchema>;
