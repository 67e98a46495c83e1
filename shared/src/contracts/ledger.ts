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
  /** Why an entry was reversed; null in every other kind, and where nobody gave a reason. */
  reason: z.string().nullable(),
});
export type LedgerEntryDto = z.infer<typeof ledgerEntrySchema>;
export const ledgerPageSchema = pageOf(ledgerEntrySchema);

/** One thing a check of the ledger found to differ, in words and, for amounts, in numbers. */
export const ledgerDifferenceSchema = z.object({
  partId: idSchema,
  positionLabel: z.string(),
  detailName: z.string().nullable(),
  entryId: idSchema.nullable(),
  sequence: z.number().nullable(),
  kind: z.enum(ENTRY_KINDS).nullable(),
  what: z.string(),
  /** Damage as the entry says and as it comes out when worked out again. */
  written: z.number().nullable(),
  recomputed: z.number().nullable(),
});
export type LedgerDifferenceDto = z.infer<typeof ledgerDifferenceSchema>;

/** The ledger of a vessel, checked: every hash and, from the stored spectra, every amount. */
export const ledgerCheckSchema = z.object({
  vesselId: idSchema,
  vesselName: z.string(),
  checkedAt: instantSchema,
  parts: z.int(),
  /** Details with entries: each has a chain of its own. */
  chains: z.int(),
  entries: z.int(),
  /** Entries whose amount was worked out again from what they name. */
  recomputed: z.int(),
  /** Reversals, compared with the entry they take back. */
  reversals: z.int(),
  differences: z.array(ledgerDifferenceSchema),
  /** Entries whose amount cannot be worked out any more, and why; their hashes are checked all the same. */
  notRecomputed: z.array(ledgerDifferenceSchema),
});
export type LedgerCheckDto = z.infer<typeof ledgerCheckSchema>;
