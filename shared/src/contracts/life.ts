import { z } from 'zod';
import { partStandingSchema } from './rig.js';
import { daySchema, idSchema, instantSchema, versionSchema } from './values.js';

export const stateUsagePlanSchema = z.strictObject({
  /** Absent on the first statement. */
  version: versionSchema.optional(),
  sailingHoursPerYear: z.number().min(0).max(8784, 'A year has 8,784 hours at most.'),
  note: z.string().max(1000).default(''),
});
export type StateUsagePlanInput = z.input<typeof stateUsagePlanSchema>;
export const usagePlanSchema = z.object({
  sailingHoursPerYear: z.number(),
  note: z.string(),
  statedByName: z.string(),
  updatedAt: instantSchema,
  version: versionSchema,
});
export type UsagePlanDto = z.infer<typeof usagePlanSchema>;
/** `plan` is null until somebody states one. */
export const usagePlanReplySchema = z.object({ plan: usagePlanSchema.nullable() });

/** One step from the log to the date: what was computed, from which numbers, by which equation. */
export const workingStepSchema = z.object({
  title: z.string(),
  equation: z.string(),
  inputs: z.array(
    z.object({
      symbol: z.string(),
      meaning: z.string(),
      value: z.number(),
      unit: z.string(),
      from: z.string(),
    }),
  ),
  result: z.object({ symbol: z.string(), value: z.number().nullable(), unit: z.string() }),
  source: z.string(),
});
export type WorkingStepDto = z.infer<typeof workingStepSchema>;

/** Everything the part page shows about one fitted part's account and dates. */
export const partLifeSchema = z.object({
  partId: idSchema,
  asOfOn: daySchema,
  standing: partStandingSchema,
  /** Sentences for the top of the page, in the trade's words, and for the owner in plain words. */
  headline: z.string(),
  plainHeadline: z.string(),
  wouldGiveDate: z.array(z.string()),
  details: z.array(
    z.object({
      detailId: idSchema,
      name: z.string(),
      curveId: z.string().nullable(),
      curveVersion: z.int().nullable(),
      curveName: z.string().nullable(),
      measure: z.string().nullable(),
      damage: z.number().nullable(),
      designFatigueFactor: z.number(),
      allowanceUsed: z.number().nullable(),
      remainingYears: z.number().nullable(),
      replaceByOn: daySchema.nullable(),
      explanation: z.string(),
      estimates: z.array(z.string()),
    }),
  ),
  /** Damage of the governing detail per day of the recording, ascending, with the log it came from. */
  days: z.array(
    z.object({ dayOn: daySchema, allowance: z.number(), maxKn: z.number().nullable(), loadLogId: idSchema }),
  ),
  worstDays: z.array(
    z.object({
      dayOn: daySchema,
      allowance: z.number(),
      shareOfTotal: z.number(),
      loadLogId: idSchema,
      loadLogName: z.string(),
    }),
  ),
  /** Counted cycles of the governing detail against its curve, binned by range in the curve's measure. */
  cycles: z.object({
    measureUnit: z.string(),
    bins: z.array(
      z.object({ rangeLow: z.number(), rangeHigh: z.number(), cycles: z.number(), damageShare: z.number() }),
    ),
    curvePoints: z.array(z.object({ range: z.number(), cyclesToFailure: z.number() })),
  }),
  forecast: z.array(z.object({ on: daySchema, allowance: z.number() })),
  assumptions: z.array(z.string()),
  working: z.array(workingStepSchema),
  logs: z.array(
    z.object({
      id: idSchema,
      fileName: z.string(),
      fromAt: instantSchema.nullable(),
      loggedHours: z.number().nullable(),
    }),
  ),
});
export type PartLifeDto = z.infer<typeof partLifeSchema>;
