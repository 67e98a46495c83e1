import { z } from 'zod';
import { provenanceSchema, referenceFirmSchema } from './curves.js';
import { TERMINALS } from './parts.js';
import { idSchema } from './values.js';

const keySchema = z.string().regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'Use lower-case words joined by hyphens.');
const withSource = {
  source: z.string().min(1),
  provenance: provenanceSchema,
  provenanceNote: z.string().min(1),
};

export const constructionSizeSchema = z.object({
  designation: z.string().min(1),
  diameterMm: z.number().positive(),
  metallicAreaMm2: z.number().positive(),
  breakingLoads: z
    .array(z.object({ gradeMpa: z.number().positive().nullable(), breakingLoadKn: z.number().positive() }))
    .min(1),
  massKgPerM: z.number().positive(),
  axialStiffnessKn: z.number().positive(),
});

/** A construction of the reference data, with its sizes. */
export const constructionSchema = z.object({
  id: keySchema,
  version: z.int().min(1),
  name: z.string().min(1),
  kind: z.enum(['1x19', '1x19-compacted', '7x19', '7x7', '6x7-fibre-core', 'rod', 'fibre']),
  kindOfWire: z.enum(['strand', 'rod', 'fibre']),
  materialId: keySchema,
  fillFactor: z.number().positive().max(1),
  youngGpa: z.number().positive(),
  replacementRuleId: keySchema.nullable(),
  sizes: z.array(constructionSizeSchema).min(1),
  ...withSource,
});
export type ConstructionDto = z.infer<typeof constructionSchema>;
export const listedConstructionSchema = z.object({ ...constructionSchema.shape, firm: referenceFirmSchema });
export type ListedConstructionDto = z.infer<typeof listedConstructionSchema>;
export const constructionListSchema = z.object({ items: z.array(listedConstructionSchema) });
export type ConstructionListDto = z.infer<typeof constructionListSchema>;

/** Wire, rod or rope a firm adds for itself: a maker's table or a certificate. Stiffness follows from area and modulus. */
export const addConstructionSchema = z.strictObject({
  name: z.string().trim().min(1, 'Give it a name.').max(120),
  kind: constructionSchema.shape.kind,
  materialId: keySchema,
  youngGpa: z.number().min(1, 'The modulus is 1 GPa or more.').max(400, 'The modulus is 400 GPa or less.'),
  replacementRuleId: keySchema.nullable().default(null),
  sizes: z
    .array(
      z.strictObject({
        diameterMm: z.number().positive('The diameter must be above zero.').max(120),
        metallicAreaMm2: z.number().positive('The area must be above zero.').max(12_000),
        breakingLoadKn: z.number().positive('The breaking load must be above zero.').max(100_000),
        massKgPerM: z.number().positive('The mass must be above zero.').max(200),
      }),
    )
    .min(1, 'Give at least one size.')
    .max(40),
  source: z.string().trim().min(1, 'Name the source: the table or certificate and its date.').max(400),
  provenance: provenanceSchema,
  provenanceNote: z.string().trim().min(1, 'Say how the figures were read or made.').max(800),
  firmId: idSchema.optional(),
});
export type AddConstructionInput = z.input<typeof addConstructionSchema>;

export const reviseConstructionSchema = z.strictObject({
  ...addConstructionSchema.omit({ firmId: true }).shape,
  version: z.int().min(1),
});
export type ReviseConstructionInput = z.input<typeof reviseConstructionSchema>;

/** reference-data/constructions.json */
export const constructionsFileSchema = z.strictObject({
  dataVersion: z.int().min(1),
  constructions: z.array(constructionSchema),
});

const bandSchema = z.tuple([z.number().positive(), z.number().positive()]);

/** reference-data/materials.json */
export const materialsFileSchema = z.strictObject({
  dataVersion: z.int().min(1),
  materials: z.array(
    z.object({
      id: keySchema,
      version: z.int().min(1),
      name: z.string().min(1),
      densityKgPerDm3: z.number().positive(),
      /** Young's modulus of the single wire, rod or fibre, GPa. */
      youngGpa: bandSchema,
      strengthMpa: bandSchema,
      /** Stiffness over breaking load of a stay made of it, without unit. */
      stiffnessOverStrength: bandSchema,
      ...withSource,
    }),
  ),
});

/** reference-data/terminals.json */
export const terminalsFileSchema = z.strictObject({
  dataVersion: z.int().min(1),
  terminals: z.array(
    z.object({
      id: z.enum(TERMINALS),
      version: z.int().min(1),
      name: z.string().min(1),
      fitsKindOfWire: z.array(z.enum(['strand', 'rod', 'fibre'])).min(1),
      staticFactor: z.number().positive().max(1).nullable(),
      staticFactorRange: bandSchema.nullable(),
      fatigueNote: z.string().min(1),
      ...withSource,
    }),
  ),
});

/** reference-data/replacement-rules.json */
export const replacementRulesFileSchema = z.strictObject({
  dataVersion: z.int().min(1),
  rules: z.array(
    z.object({
      id: keySchema,
      version: z.int().min(1),
      name: z.string().min(1),
      action: z.enum(['replace', 'inspect']),
      years: z.object({
        hard: z.number().positive(),
        general: z.number().positive(),
        light: z.number().positive(),
      }),
      limitYears: z.number().positive().nullable(),
      distanceNm: z.number().positive().nullable(),
      advice: z.string().min(1),
      ...withSource,
    }),
  ),
});

/** reference-data/threads.json */
export const threadsFileSchema = z.strictObject({
  dataVersion: z.int().min(1),
  threads: z.array(
    z.object({
      designation: z.string().min(1),
      family: z.enum(['metric-coarse', 'metric-fine', 'unf']),
      version: z.int().min(1),
      diameterMm: z.number().positive(),
      pitchMm: z.number().positive(),
      tensileStressAreaMm2: z.number().positive(),
    }),
  ),
  ...withSource,
});
