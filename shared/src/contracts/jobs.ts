import { z } from 'zod';
import { pageOf } from './pagination.js';
import { idSchema, instantSchema } from './values.js';

export const JOB_STATES = ['queued', 'running', 'done', 'failed', 'cancelled'] as const;
/** A background job as the browser polls it. `progress` is 0 to 1, in bytes read. */
export const jobSchema = z.object({
  id: idSchema,
  kind: z.string(),
  subjectId: idSchema,
  state: z.enum(JOB_STATES),
  progress: z.number(),
  attempts: z.int(),
  error: z.object({ code: z.string(), message: z.string() }).nullable(),
  createdAt: instantSchema,
  startedAt: instantSchema.nullable(),
  finishedAt: instantSchema.nullable(),
});
export type JobDto = z.infer<typeof jobSchema>;
export const jobPageSchema = pageOf(jobSchema);
