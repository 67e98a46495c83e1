import { z } from 'zod';
import { pageOf, pageQuerySchema } from './pagination.js';
import { idSchema, instantSchema } from './values.js';

export const auditEventSchema = z.object({
  id: idSchema,
  at: instantSchema,
  userName: z.string().nullable(),
  vesselId: idSchema.nullable(),
  action: z.string(),
  subjectKind: z.string(),
  subjectId: z.string(),
});
export type AuditEventDto = z.infer<typeof auditEventSchema>;
export const auditPageSchema = pageOf(auditEventSchema);
export const auditQuerySchema = z.strictObject({ ...pageQuerySchema.shape, vesselId: idSchema.optional() });
