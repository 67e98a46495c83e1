import { z } from 'zod';
import { idSchema } from './values.js';

export const provenanceSchema = z.enum([
  'published',
  'published, secondary',
  'from memory',
  'estimate',
  'derived',
]);

export const curveSegmentSchema = z.object({
  /** Lowest range this segment serves, in the measure of the curve. */
  above: z.number().min(0),
  m: z.number().positive(),
  log10a: z.number(),
});

const sizeRuleSchema = z.object({ exponent: z.number().min(0), referenceMm: z.number().positive() });

export const CURVE_MEASURES = [
  'stress-nominal',
  'stress-metallic',
  'stress-thread',
  'stress-shear',
  'load-ratio',
] as const;

/** A curve as the reference data hold it and the API shows it; the engine's ReferenceCurve on the wire. */
export const curveSchema = z.object({
  id: z.string().regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'Use lower-case words joined by hyphens.'),
  version: z.int().min(1),
  name: z.string().min(1),
  appliesTo: z.string().min(1),
  measure: z.enum(CURVE_MEASURES),
  level: z.enum(['mean', 'mean-minus-k-sd', 'fractile-95-75', 'unknown']),
  k: z.number().min(0),
  sdLog10N: z.number().positive().nullable(),
  environment: z.enum([
    'air',
    'corrosion-protected',
    'seawater-cathodic-protection',
    'seawater-free-corrosion',
  ]),
  segments: z.array(curveSegmentSchema).min(1),
  meanLoad: z.discriminatedUnion('kind', [
    z.object({ kind: z.literal('none'), reason: z.string().min(1) }),
    z.object({
      kind: z.literal('load-ratio-exponent'),
      perMeanRatio: z.number().positive(),
      minRatio: z.number(),
      maxRatio: z.number(),
      reason: z.string().min(1),
    }),
    z.object({ kind: z.literal('rule-allowed'), referenceR: z.number().lt(1), reason: z.string().min(1) }),
  ]),
  thickness: sizeRuleSchema.nullable(),
  threadSize: sizeRuleSchema.nullable(),
  cutOffRange: z.number().positive().nullable(),
  validity: z.object({
    minRange: z.number().nullable(),
    maxRange: z.number().nullable(),
    note: z.string(),
  }),
  source: z.string().min(1),
  provenance: provenanceSchema,
  provenanceNote: z.string().min(1),
  analogyNote: z.string().min(1),
  selectable: z.boolean(),
});
export type CurveDto = z.infer<typeof curveSchema>;

/** reference-data/curves.json */
export const curvesFileSchema = z.strictObject({ dataVersion: z.int().min(1), curves: z.array(curveSchema) });

/** Whose a row of the reference data is: the firm that added it, or null for what comes with the product. */
export const referenceFirmSchema = z.object({ id: idSchema, name: z.string() }).nullable();

export const listedCurveSchema = z.object({ ...curveSchema.shape, firm: referenceFirmSchema });
export type ListedCurveDto = z.infer<typeof listedCurveSchema>;
export const curveListSchema = z.object({ items: z.array(listedCurveSchema) });
export type CurveListDto = z.infer<typeof curveListSchema>;

const rangeLimitSchema = z.number().positive('The range must be above zero.').max(1e5).nullable();

/** A curve a firm adds for itself. The service gives it its id and version. */
export const addCurveSchema = z.strictObject({
  name: z.string().trim().min(1, 'Give the curve a name.').max(120),
  appliesTo: z.string().trim().min(1, 'Say which part was tested.').max(200),
  measure: z.enum(CURVE_MEASURES),
  level: z.enum(['mean', 'mean-minus-k-sd', 'unknown']),
  k: z.number().min(0).max(5).default(0),
  sdLog10N: z.number().positive('The scatter must be above zero.').max(2).nullable().default(null),
  environment: curveSchema.shape.environment,
  segments: z
    .array(
      z.strictObject({
        above: z.number().min(0),
        m: z.number().min(1, 'A slope is 1 or more.').max(30, 'A slope is 30 or less.'),
        log10a: z.number().min(-50).max(100),
      }),
    )
    .min(1)
    .max(3),
  validity: z.strictObject({ minRange: rangeLimitSchema, maxRange: rangeLimitSchema }),
  source: z.string().trim().min(1, 'Name the source: the report, its number and its date.').max(400),
  provenance: provenanceSchema,
  provenanceNote: z.string().trim().min(1, 'Say how the figures were read or made.').max(800),
  analogyNote: z.string().trim().min(1, 'Say how far the tests are from the part it will serve.').max(400),
  /** Firm the curve belongs to; may be left out when the person belongs to one firm that may add. */
  firmId: idSchema.optional(),
});
export type AddCurveInput = z.input<typeof addCurveSchema>;

/** A correction: the next version beside the ones accounts were computed with. */
export const reviseCurveSchema = z.strictObject({
  ...addCurveSchema.omit({ firmId: true }).shape,
  /** The version it corrects; 409 when there is a newer one. */
  version: z.int().min(1),
});
export type ReviseCurveInput = z.input<typeof reviseCurveSchema>;
