import { z } from 'zod';
import { pageOf, pageQuerySchema } from './pagination.js';
import { ASSESSMENTS } from './rig.js';
import { daySchema, idSchema, instantSchema, versionSchema, zoneSchema } from './values.js';

export const RIG_TYPES = [
  'masthead-sloop',
  'fractional-sloop',
  'cutter',
  'ketch',
  'yawl',
  'schooner',
  'other',
] as const;
export const USE_KINDS = ['private', 'charter', 'sail-training', 'sail-cargo'] as const;

const vesselFields = {
  name: z.string().trim().min(1, 'Give the vessel a name.').max(120),
  rigType: z.enum(RIG_TYPES),
  zone: zoneSchema,
  buildYear: z.int().min(1800).max(2100).nullable(),
  lengthM: z.number().positive().max(200).nullable(),
  homePort: z.string().trim().max(120).nullable(),
  useKind: z.enum(USE_KINDS),
  notes: z.string().max(4000),
};

export const createVesselSchema = z.strictObject({
  ...vesselFields,
  buildYear: vesselFields.buildYear.default(null),
  lengthM: vesselFields.lengthM.default(null),
  homePort: vesselFields.homePort.default(null),
  useKind: vesselFields.useKind.default('private'),
  notes: vesselFields.notes.default(''),
  /** Firm that will look after it; may be left out when the person belongs to one such firm. */
  firmId: idSchema.optional(),
});
export type CreateVesselInput = z.input<typeof createVesselSchema>;

/** A new vessel with the rig of another: positions, geometry and, if wanted, what is fitted, without days and papers. */
export const createSisterSchema = z.strictObject({
  name: vesselFields.name,
  withParts: z.boolean(),
});
export type CreateSisterInput = z.infer<typeof createSisterSchema>;

export const updateVesselSchema = z.strictObject({
  version: versionSchema,
  ...z.object(vesselFields).partial().shape,
});
export type UpdateVesselInput = z.infer<typeof updateVesselSchema>;

export const vesselSchema = z.object({
  id: idSchema,
  ...vesselFields,
  zone: z.string(),
  firmId: idSchema,
  firmName: z.string(),
  /** What the person asking may do on this vessel. */
  permissions: z.array(z.string()),
  createdAt: instantSchema,
  version: versionSchema,
});
export type VesselDto = z.infer<typeof vesselSchema>;

/** One row of the fleet: the part that governs, and how much of the picture is missing. */
export const fleetRowSchema = z.object({
  id: idSchema,
  name: z.string(),
  rigType: z.enum(RIG_TYPES),
  homePort: z.string().nullable(),
  useKind: z.enum(USE_KINDS),
  /** Zone of the vessel: her days are read in it. */
  zone: z.string(),
  governing: z
    .object({
      partId: idSchema,
      positionLabel: z.string(),
      kindOfWire: z.enum(['strand', 'rod', 'fibre']),
      assessment: z.enum(ASSESSMENTS),
      replaceByOn: daySchema,
      rule: z.enum(['fatigue', 'calendar']),
      allowanceUsed: z.number().nullable(),
      due: z.enum(['in-date', 'due', 'overdue']),
    })
    .nullable(),
  counts: z.object({
    parts: z.int(),
    overdue: z.int(),
    due: z.int(),
    assessed: z.int(),
    notAssessed: z.int(),
    calendarOnly: z.int(),
    logsWaiting: z.int(),
  }),
  loggedHours: z.number(),
  lastLogAt: instantSchema.nullable(),
});
export type FleetRowDto = z.infer<typeof fleetRowSchema>;

export const FLEET_SORTS = ['due', 'name', 'last-log'] as const;
export const vesselListQuerySchema = z.strictObject({
  ...pageQuerySchema.shape,
  q: z.string().trim().max(120).optional(),
  sort: z.enum(FLEET_SORTS).default('due'),
  filter: z.enum(['all', 'overdue', 'due', 'waiting', 'not-assessed']).default('all'),
});
export type VesselListQuery = z.input<typeof vesselListQuerySchema>;
export const vesselPageSchema = pageOf(fleetRowSchema);
export type VesselPageDto = z.infer<typeof vesselPageSchema>;
