import { z } from 'zod';
import { partStandingSchema } from './rig.js';
import { daySchema, idSchema, instantSchema, versionSchema } from './values.js';

/** Keys of reference-data/terminals.json. */
export const TERMINALS = [
  'swaged',
  'mechanical',
  'poured-socket',
  'ferrule-eye',
  'cold-head',
  'spliced-eye',
  'unknown',
] as const;

/** How freely an end turns; the same words as `shared/rig/articulation`. */
export const ARTICULATIONS = ['both-planes', 'one-plane', 'none', 'seized'] as const;

const elementSchema = z.strictObject({
  /** False where the assembly has none, such as a lashing instead of a turnbuckle. */
  there: z.boolean(),
  /** kN by its papers; null: not known. */
  breakingLoadKn: z.number().positive('The breaking load must be above zero.').max(100_000).nullable(),
});
/** What stands in line with the wire between mast and hull, and how its ends turn. */
export const partHardwareSchema = z.strictObject({
  turnbuckle: elementSchema,
  toggle: elementSchema,
  pin: elementSchema,
  chainplate: elementSchema,
  /** null: nobody looked; one plane is taken, and said. */
  upperArticulation: z.enum(ARTICULATIONS).nullable(),
  lowerArticulation: z.enum(ARTICULATIONS).nullable(),
});
export type PartHardware = z.infer<typeof partHardwareSchema>;

const partFields = {
  constructionId: z.string().min(1).max(80),
  diameterMm: z.number().positive('The diameter must be above zero.').max(120),
  /** kN; null: taken from the table of the construction (lower grade, flagged). */
  breakingLoadKn: z.number().positive('The breaking load must be above zero.').max(100_000).nullable(),
  breakingLoadFromCertificate: z.boolean(),
  lengthM: z.number().positive().max(200).nullable(),
  upperTerminal: z.enum(TERMINALS),
  lowerTerminal: z.enum(TERMINALS),
  threadSize: z.string().max(20).nullable(),
  pinDiameterMm: z.number().positive().max(200).nullable(),
  /** null: not described; each element then counts as there and of unknown strength. */
  hardware: partHardwareSchema.nullable(),
  batch: z.string().max(120),
  certificate: z.string().max(200),
  /** null: not known; the calendar then runs from the vessel's build year. */
  fittedOn: daySchema.nullable(),
  notes: z.string().max(4000),
};
export const fitPartSchema = z.strictObject({
  ...partFields,
  breakingLoadKn: partFields.breakingLoadKn.default(null),
  breakingLoadFromCertificate: partFields.breakingLoadFromCertificate.default(false),
  lengthM: partFields.lengthM.default(null),
  upperTerminal: partFields.upperTerminal.default('unknown'),
  lowerTerminal: partFields.lowerTerminal.default('unknown'),
  threadSize: partFields.threadSize.default(null),
  pinDiameterMm: partFields.pinDiameterMm.default(null),
  hardware: partFields.hardware.default(null),
  batch: partFields.batch.default(''),
  certificate: partFields.certificate.default(''),
  fittedOn: partFields.fittedOn.default(null),
  notes: partFields.notes.default(''),
  /** Fits the same into the twin on the other side, which must be there and empty. */
  alsoOtherSide: z.boolean().default(false),
});
export type FitPartInput = z.input<typeof fitPartSchema>;

/** A part described so far, to be told how strong it would be as assembled. */
export const describedPartSchema = z.strictObject({
  constructionId: partFields.constructionId,
  diameterMm: partFields.diameterMm,
  breakingLoadKn: partFields.breakingLoadKn,
  upperTerminal: partFields.upperTerminal,
  lowerTerminal: partFields.lowerTerminal,
  hardware: partFields.hardware,
});
export type DescribedPartInput = z.infer<typeof describedPartSchema>;
export const assemblySchema = z.object({
  breakingLoadKn: z.number().nullable(),
  weakestElement: z.string().nullable(),
  unknownElements: z.array(z.string()),
});
export type AssemblyDto = z.infer<typeof assemblySchema>;

export const updatePartSchema = z.strictObject({
  version: versionSchema,
  ...z.object(partFields).partial().shape,
});
export type UpdatePartInput = z.infer<typeof updatePartSchema>;

/** Ends the part's account; the position becomes free for a new part. */
export const removePartSchema = z.strictObject({
  version: versionSchema,
  removedOn: daySchema,
  reason: z.string().trim().min(1, 'Say why it was taken off.').max(400),
});
export type RemovePartInput = z.infer<typeof removePartSchema>;

export const partDetailSchema = z.object({
  id: idSchema,
  key: z.string(),
  name: z.string(),
  kind: z.string(),
  curveId: z.string().nullable(),
  curveVersion: z.int().nullable(),
  designFatigueFactor: z.number(),
  /** MPa per kN (or 1 / breaking load for load-ratio curves); null where not assessable. */
  factor: z.number().nullable(),
  explanation: z.string(),
  estimates: z.array(z.string()),
});
export type PartDetailDto = z.infer<typeof partDetailSchema>;

export const fittedPartSchema = z.object({
  id: idSchema,
  vesselId: idSchema,
  positionId: idSchema,
  positionLabel: z.string(),
  positionAlias: z.string().nullable(),
  ...partFields,
  constructionVersion: z.int(),
  constructionName: z.string(),
  kindOfWire: z.enum(['strand', 'rod', 'fibre']),
  breakingLoadKn: z.number(),
  breakingLoadSource: z.enum(['certificate', 'table', 'table-lower-grade']),
  metallicAreaMm2: z.number(),
  assembly: assemblySchema,
  removedOn: daySchema.nullable(),
  removedReason: z.string().nullable(),
  standing: partStandingSchema,
  details: z.array(partDetailSchema),
  createdAt: instantSchema,
  version: versionSchema,
});
export type FittedPartDto = z.infer<typeof fittedPartSchema>;
