import { z } from 'zod';
import { pageOf } from './pagination.js';
import { idSchema, instantSchema } from './values.js';

export const FIRM_KINDS = ['rigging', 'survey', 'insurer', 'service'] as const;
export const firmSchema = z.object({
  id: idSchema,
  name: z.string(),
  kind: z.enum(FIRM_KINDS),
  members: z.int(),
  createdAt: instantSchema,
});
export type FirmDto = z.infer<typeof firmSchema>;
export const firmPageSchema = pageOf(firmSchema);
