import { z } from 'zod';
import { pageOf } from './pagination.js';
import { idSchema, instantSchema } from './values.js';

export const ENTRY_KINDS = [
  'carried-in',
  'recorded',
  'between-logs',
  'unlogged',
  'sampling-correction',
  'reversal',
] as const;

/** One line of a part's account. `damage` is the design damage (before the design fatigue factor); negative in a reversal. */
export const ledgerEntrySchema = z.object({
  id: idSchema,
  detailId: idSchema,
  detailName: z.string(),
  sequence: z.number(),
  kind: z.enum(ENTRY_KINDS),
  damage: z.number(),
  allowance: z.number(),
  loadLogId: idSchema.nullable(),
  loadLogName: z.string().nullable(),
  reversesId: idSchema.nullable(),
  curveId: z.string(),
  curveVersion: z.int(),
  engineVersion: z.string(),
  postedByName: z.string().nullable(),
  postedAt: instantSchema,
  hash: z.string(),
});
export type LedgerEntryDto = z.infer<typeof ledgerEntrySchema>;
export const ledgerPageSchema = pageOf(ledgerEntrySchema);
