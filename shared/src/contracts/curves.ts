import { z } from 'zod';

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

export const curveListSchema = z.object({ items: z.array(curveSchema) });
export type CurveListDto = z.infer<typeof curveListSchema>;
