import { z } from 'zod';
import { daySchema, idSchema, versionSchema } from './values.js';

export const SIDES = ['port', 'starboard', 'centre'] as const;

/** Kinds of position, each with its full word in `shared/rig/positions`. */
const positionFields = {
  kind: z.string().trim().min(1).max(60),
  side: z.enum(SIDES),
  label: z.string().trim().min(1, 'Say what this place on the rig is called.').max(120),
  mast: z.string().trim().min(1).max(40),
};
export const createPositionSchema = z.strictObject({
  ...positionFields,
  /** Left out: made from kind, side and mast ("Cap shroud, port"). */
  label: positionFields.label.optional(),
  mast: positionFields.mast.default('main'),
});
export type CreatePositionInput = z.input<typeof createPositionSchema>;
export const updatePositionSchema = z.strictObject({
  version: versionSchema,
  ...z.object(positionFields).partial().shape,
});
export type UpdatePositionInput = z.infer<typeof updatePositionSchema>;

export const ASSESSMENTS = ['assessed', 'not-assessed', 'calendar-only'] as const;
export const DUE_STATES = ['in-date', 'due', 'overdue', 'no-date'] as const;

/** The short form of a part's standing, for tables. Allowance used is a ratio: 1 is the whole allowance. */
export const partStandingSchema = z.object({
  assessment: z.enum(ASSESSMENTS),
  notAssessedReason: z.string().nullable(),
  loadBasis: z.enum(['measured', 'mirrored', 'in-line', 'none']),
  allowanceUsed: z.number().nullable(),
  governingDetail: z.string().nullable(),
  loggedHours: z.number(),
  fatigueReplaceByOn: daySchema.nullable(),
  calendarReplaceByOn: daySchema.nullable(),
  replaceByOn: daySchema.nullable(),
  governingRule: z.enum(['fatigue', 'calendar']).nullable(),
  remainingYears: z.number().nullable(),
  due: z.enum(DUE_STATES),
});
export type PartStandingDto = z.infer<typeof partStandingSchema>;

export const positionSchema = z.object({
  id: idSchema,
  vesselId: idSchema,
  ...positionFields,
  alias: z.string().nullable(),
  version: versionSchema,
  part: z
    .object({
      id: idSchema,
      constructionName: z.string(),
      kindOfWire: z.enum(['strand', 'rod', 'fibre']),
      diameterMm: z.number(),
      breakingLoadKn: z.number(),
      fittedOn: daySchema.nullable(),
      standing: partStandingSchema,
    })
    .nullable(),
});
export type PositionDto = z.infer<typeof positionSchema>;
export const rigSchema = z.object({ items: z.array(positionSchema) });
export type RigDto = z.infer<typeof rigSchema>;
