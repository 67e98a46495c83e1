import { z } from 'zod';
import { partStandingSchema } from './rig.js';
import { daySchema, idSchema } from './values.js';

/** A part a position has had, with where its account stands or stood when it came off. */
const partOfPositionSchema = z.object({
  id: idSchema,
  constructionName: z.string(),
  kindOfWire: z.enum(['strand', 'rod', 'fibre']),
  diameterMm: z.number(),
  breakingLoadKn: z.number(),
  batch: z.string(),
  /** null: not known. */
  fittedOn: daySchema.nullable(),
  /** null: still in place. */
  removedOn: daySchema.nullable(),
  removedReason: z.string().nullable(),
  /** Entries in its account, reversals included. */
  entries: z.int(),
  standing: partStandingSchema,
});
export type PartOfPositionDto = z.infer<typeof partOfPositionSchema>;

/** All parts a position has had, the newest first. */
export const positionHistorySchema = z.object({
  positionId: idSchema,
  vesselId: idSchema,
  vesselName: z.string(),
  zone: z.string(),
  label: z.string(),
  alias: z.string().nullable(),
  parts: z.array(partOfPositionSchema),
});
export type PositionHistoryDto = z.infer<typeof positionHistorySchema>;
