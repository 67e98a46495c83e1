import { z } from 'zod';
import { daySchema, idSchema, instantSchema, versionSchema } from './values.js';

export const SENSOR_KINDS = ['pin', 'link', 'ram-pressure', 'strain', 'raw'] as const;
export const SENSOR_EVENT_KINDS = ['zero-check', 'calibration', 'battery'] as const;
/** How the rig stood when a zero was taken. Under tension the zero is no zero, and the tension has to be stated. */
export const RIG_STATES = ['slack', 'dock-tune', 'unstepped', 'unknown'] as const;

const positive = z.number().positive('It must be above zero.');

/**
 * What turns a reading into a force, by kind of sensor: a ram's pressure needs its area, a strain its axial stiffness, a
 * raw signal two points. Load pins and links speak in force already.
 */
export const sensorScaleSchema = z.discriminatedUnion('by', [
  z.strictObject({ by: z.literal('ram-area'), areaMm2: positive.max(1e6) }),
  z.strictObject({ by: z.literal('axial-stiffness'), axialStiffnessKn: positive.max(1e7) }),
  z.strictObject({
    by: z.literal('two-points'),
    lowRaw: z.number(),
    lowKn: z.number(),
    highRaw: z.number(),
    highKn: z.number(),
  }),
]);
export type SensorScale = z.infer<typeof sensorScaleSchema>;

const sensorFields = {
  name: z.string().trim().min(1, 'Give the sensor the name your logger uses.').max(80),
  kind: z.enum(SENSOR_KINDS),
  /** The place whose load it measures; null: not placed. */
  positionId: idSchema.nullable(),
  fullScaleKn: positive.max(1e5).nullable(),
  /** Percent of full scale, from its papers. */
  errorPercent: positive.max(50).nullable(),
  scale: sensorScaleSchema.nullable(),
  /** Places that carry the same load as the measured one, with nothing joining in between. */
  inLine: z.array(idSchema).max(20),
  placedOn: daySchema.nullable(),
  removedOn: daySchema.nullable(),
  notes: z.string().max(2000),
};

export const addSensorSchema = z.strictObject({
  ...sensorFields,
  positionId: sensorFields.positionId.default(null),
  fullScaleKn: sensorFields.fullScaleKn.default(null),
  errorPercent: sensorFields.errorPercent.default(null),
  scale: sensorFields.scale.default(null),
  inLine: sensorFields.inLine.default([]),
  placedOn: sensorFields.placedOn.default(null),
  removedOn: sensorFields.removedOn.default(null),
  notes: sensorFields.notes.default(''),
});
export type AddSensorInput = z.input<typeof addSensorSchema>;

export const updateSensorSchema = z.strictObject({
  version: versionSchema,
  ...z.object(sensorFields).partial().shape,
});
export type UpdateSensorInput = z.infer<typeof updateSensorSchema>;

/** A zero check, a calibration or a battery: added, never changed. */
export const addSensorEventSchema = z.strictObject({
  kind: z.enum(SENSOR_EVENT_KINDS),
  doneOn: daySchema,
  readingKn: z.number().min(-1e5).max(1e5).nullable().default(null),
  rigState: z.enum(RIG_STATES).nullable().default(null),
  statedTensionKn: z.number().min(0).max(1e5).nullable().default(null),
  batteryHours: positive.max(1e5).nullable().default(null),
  note: z.string().trim().max(1000).default(''),
});
export type AddSensorEventInput = z.input<typeof addSensorEventSchema>;

export const sensorEventSchema = z.object({
  id: idSchema,
  kind: z.enum(SENSOR_EVENT_KINDS),
  doneOn: daySchema,
  readingKn: z.number().nullable(),
  rigState: z.enum(RIG_STATES).nullable(),
  statedTensionKn: z.number().nullable(),
  batteryHours: z.number().nullable(),
  note: z.string(),
  recordedByName: z.string(),
  createdAt: instantSchema,
});
export type SensorEventDto = z.infer<typeof sensorEventSchema>;

export const sensorSchema = z.object({
  id: idSchema,
  vesselId: idSchema,
  ...sensorFields,
  positionLabel: z.string().nullable(),
  /** Newest first. */
  events: z.array(sensorEventSchema),
  /** What is missing before its zero or scale can be relied on, one sentence each. */
  wants: z.array(z.string()),
  version: versionSchema,
});
export type SensorDto = z.infer<typeof sensorSchema>;
export const sensorListSchema = z.object({ items: z.array(sensorSchema) });
export type SensorListDto = z.infer<typeof sensorListSchema>;
