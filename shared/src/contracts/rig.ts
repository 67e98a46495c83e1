import { z } from 'zod';
import { daySchema, idSchema, versionSchema } from './values.js';

/** Keys of `shared/rig/templates`. */
export const RIG_TEMPLATES = [
  'masthead-sloop',
  'fractional-sloop',
  'cutter',
  'ketch',
  'yawl',
  'schooner',
  'unstayed-mizzen',
] as const;
const MOST_MASTS = 4;
const MOST_SPREADERS = 5;

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

const metres = (least: number, most: number) => z.number().min(least).max(most);
/** See `shared/rig/geometry` for the axes. */
export const rigPointSchema = z.strictObject({
  aftM: metres(-60, 200),
  starboardM: metres(-40, 40),
  upM: metres(-20, 120),
});
export const mastGeometrySchema = z
  .strictObject({
    key: z.string().trim().min(1).max(40),
    footAftM: metres(-10, 200),
    footUpM: metres(-10, 20),
    heightM: metres(0.5, 100),
    houndsHeightM: metres(0.5, 100),
    rakeDegrees: z.number().min(-20).max(30),
    spreaders: z
      .array(
        z.strictObject({
          heightM: metres(0.1, 100),
          lengthM: metres(0.05, 10),
          sweepDegrees: z.number().min(-20).max(60),
        }),
      )
      .max(MOST_SPREADERS),
    stayed: z.boolean(),
  })
  .check((context) => {
    const { heightM, houndsHeightM, spreaders } = context.value;
    if (houndsHeightM > heightM) {
      context.issues.push({
        code: 'custom',
        input: houndsHeightM,
        path: ['houndsHeightM'],
        message: 'The hounds cannot be above the masthead.',
      });
    }
    spreaders.forEach((spreader, index) => {
      const below = spreaders[index - 1];
      if (spreader.heightM > heightM || (below && spreader.heightM <= below.heightM)) {
        context.issues.push({
          code: 'custom',
          input: spreader.heightM,
          path: ['spreaders', index, 'heightM'],
          message: 'Enter spreaders from the lowest up, none above the masthead.',
        });
      }
    });
  });
export const rigGeometrySchema = z.strictObject({
  deckLengthM: metres(1, 200),
  beamM: metres(0.3, 40),
  bowspritTip: rigPointSchema.nullable(),
  /** From the bow aft. */
  masts: z.array(mastGeometrySchema).min(1, 'A rig has a mast.').max(MOST_MASTS),
});
export const positionGeometrySchema = z.strictObject({
  lower: rigPointSchema,
  via: z.array(rigPointSchema).max(MOST_SPREADERS),
  upper: rigPointSchema,
});

export const GEOMETRY_SOURCES = ['entered', 'suggested'] as const;
/** Geometry of a whole rig: what somebody entered, and for the rest what is usual for the type. */
export const drawnRigSchema = z.object({
  source: z.enum(GEOMETRY_SOURCES),
  geometry: rigGeometrySchema,
  /** null: nobody entered a geometry yet. */
  version: versionSchema.nullable(),
  positions: z.array(
    z.object({
      positionId: idSchema,
      source: z.enum(GEOMETRY_SOURCES),
      /** null for running rigging, and for a mast the geometry does not have. */
      geometry: positionGeometrySchema.nullable(),
      lengthM: z.number().nullable(),
    }),
  ),
});
export type DrawnRigDto = z.infer<typeof drawnRigSchema>;

/** Saves hull and masts, and the runs of the named positions; null lets a run follow the masts again. */
export const saveGeometrySchema = z.strictObject({
  version: versionSchema.nullable(),
  geometry: rigGeometrySchema,
  positions: z
    .array(z.strictObject({ positionId: idSchema, geometry: positionGeometrySchema.nullable() }))
    .max(200)
    .default([]),
});
export type SaveGeometryInput = z.input<typeof saveGeometrySchema>;

/** Creates the positions of a rig type that are not there yet. */
export const applyTemplateSchema = z.strictObject({
  template: z.enum(RIG_TEMPLATES),
  spreaders: z.int().min(0).max(MOST_SPREADERS).optional(),
});
export type ApplyTemplateInput = z.infer<typeof applyTemplateSchema>;

/** Port and starboard of one kind, entered once. */
export const createPairSchema = z.strictObject({
  kind: positionFields.kind,
  mast: positionFields.mast.default('main'),
});
export type CreatePairInput = z.input<typeof createPairSchema>;

export const LOAD_BASES = ['measured', 'mirrored', 'in-line', 'none'] as const;
/** Where the loads of each place can come from, by its sensors. */
export const loadBasesSchema = z.object({
  items: z.array(
    z.object({
      positionId: idSchema,
      basis: z.enum(LOAD_BASES),
      /** The measured place the loads come from. */
      throughLabel: z.string().nullable(),
      words: z.string(),
      improve: z.string().nullable(),
    }),
  ),
});
export type LoadBasesDto = z.infer<typeof loadBasesSchema>;

/** A rig as one CSV text, in the columns of `shared/rig/csv`. */
export const rigCsvSchema = z.object({ fileName: z.string(), csv: z.string() });
export type RigCsvDto = z.infer<typeof rigCsvSchema>;
export const importRigSchema = z.strictObject({
  csv: z.string().min(1, 'The file is empty.').max(200_000),
  /** false: only says what would happen. */
  apply: z.boolean(),
});
export type ImportRigInput = z.infer<typeof importRigSchema>;
export const importedRigSchema = z.object({
  applied: z.boolean(),
  lines: z.array(
    z.object({
      line: z.int(),
      label: z.string(),
      outcome: z.enum(['adds-position-and-part', 'adds-position', 'fits-part', 'left-alone', 'wrong']),
      errors: z.array(z.string()),
    }),
  ),
});
export type ImportedRigDto = z.infer<typeof importedRigSchema>;
