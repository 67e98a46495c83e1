import { z } from 'zod';
import { jobSchema } from './jobs.js';
import { pageOf } from './pagination.js';
import { idSchema, instantSchema, versionSchema } from './values.js';

export const LOAD_LOG_STATES = [
  'receiving',
  'received',
  'counting',
  'counted',
  'posted',
  'set-aside',
  'failed',
] as const;
export type LoadLogState = (typeof LOAD_LOG_STATES)[number];

export const LOAD_UNITS = ['kN', 'N', 'kgf', 'daN', 'lbf', 'tf'] as const;

/** Wider tables are refused before they are read: a form with a line for each column would no longer answer. */
export const LOG_COLUMNS_MAX = 1000;

/** Slower than this, rows are no record of loads, and a long file would end in a far century. */
export const LOG_RATE_MIN_HZ = 0.0001;

/** How the file is to be read: which column is the time, which columns are loads of which positions. */
export const logMappingSchema = z.strictObject({
  delimiter: z.enum([',', ';', '\t', '|', ' ']).default(','),
  decimalComma: z.boolean().default(false),
  time: z.union([
    z.strictObject({
      column: z.string().min(1).max(300),
      format: z.enum(['iso', 'epoch-s', 'epoch-ms']),
      /** For ISO times without an offset: minutes east of UTC. */
      naiveOffsetMinutes: z.int().min(-720).max(840).default(0),
    }),
    z.strictObject({
      rateHz: z.number().min(LOG_RATE_MIN_HZ, 'At least one row in three hours.').max(100_000),
      startAt: instantSchema,
    }),
  ]),
  channels: z
    .array(
      z.strictObject({
        column: z.string().min(1).max(300),
        unit: z.enum(LOAD_UNITS),
        positionId: idSchema,
      }),
    )
    .min(1, 'Match at least one column to a position.')
    .max(64),
});
export type LogMapping = z.infer<typeof logMappingSchema>;

export const LOAD_LOG_SIZE_MAX_BYTES = 20 * 1024 ** 3;

/** Announces a file before its bytes go up over tus (`/api/uploads`, metadata `loadLogId`). */
export const createLoadLogSchema = z.strictObject({
  fileName: z.string().trim().min(1).max(300),
  sizeBytes: z.int().min(1, 'The file is empty.').max(LOAD_LOG_SIZE_MAX_BYTES),
  mapping: logMappingSchema,
});
export type CreateLoadLogInput = z.input<typeof createLoadLogSchema>;

/** A failed or counted log may be read again with another mapping. */
export const recountLoadLogSchema = z.strictObject({ version: versionSchema, mapping: logMappingSchema });
export type RecountLoadLogInput = z.infer<typeof recountLoadLogSchema>;

export const postLoadLogSchema = z.strictObject({ version: versionSchema });
export type PostLoadLogInput = z.infer<typeof postLoadLogSchema>;
export const setAsideLoadLogSchema = z.strictObject({
  version: versionSchema,
  reason: z.string().trim().min(1, 'Say why it is set aside.').max(1000),
});
export type SetAsideLoadLogInput = z.infer<typeof setAsideLoadLogSchema>;
/** Takes a posted log back: its entries are reversed, and it waits for a decision again. */
export const reverseLoadLogSchema = z.strictObject({
  version: versionSchema,
  reason: z.string().trim().min(1, 'Say why it is taken back.').max(1000),
});
export type ReverseLoadLogInput = z.infer<typeof reverseLoadLogSchema>;

export const logFindingSchema = z.object({
  code: z.string(),
  severity: z.enum(['info', 'warning', 'serious']),
  column: z.string().nullable(),
  fromAt: instantSchema.nullable(),
  toAt: instantSchema.nullable(),
  line: z.int().nullable(),
  count: z.int(),
  message: z.string(),
  action: z.string(),
});
export type LogFindingDto = z.infer<typeof logFindingSchema>;

export const loadLogSchema = z.object({
  id: idSchema,
  vesselId: idSchema,
  vesselName: z.string(),
  state: z.enum(LOAD_LOG_STATES),
  fileName: z.string(),
  sizeBytes: z.number(),
  receivedBytes: z.number(),
  sha256: z.string().nullable(),
  mapping: logMappingSchema,
  rows: z.number().nullable(),
  fromAt: instantSchema.nullable(),
  toAt: instantSchema.nullable(),
  loggedHours: z.number().nullable(),
  sampleRateHz: z.number().nullable(),
  findings: z.array(logFindingSchema),
  failure: z.object({ code: z.string(), message: z.string() }).nullable(),
  /** Another log of this vessel holds the same bytes. */
  sameFileAs: z.object({ id: idSchema, state: z.enum(LOAD_LOG_STATES), fileName: z.string() }).nullable(),
  uploadedByName: z.string(),
  decidedByName: z.string().nullable(),
  decidedAt: instantSchema.nullable(),
  decisionReason: z.string().nullable(),
  job: jobSchema.nullable(),
  createdAt: instantSchema,
  version: versionSchema,
});
export type LoadLogDto = z.infer<typeof loadLogSchema>;
export const loadLogPageSchema = pageOf(loadLogSchema);

/** Extremes of one channel per stretch of time; arrays of equal length, instants as epoch milliseconds. */
export const traceSchema = z.object({
  column: z.string(),
  positionId: idSchema,
  positionLabel: z.string(),
  samples: z.number(),
  missing: z.number(),
  closedCycles: z.number(),
  minKn: z.number().nullable(),
  maxKn: z.number().nullable(),
  maxAt: instantSchema.nullable(),
  atMs: z.array(z.number()),
  lowKn: z.array(z.number()),
  highKn: z.array(z.number()),
});

export const logReviewSchema = z.object({
  log: loadLogSchema,
  traces: z.array(traceSchema),
  /** Per part and detail: allowance used before this log and after posting it (1 = the whole allowance). */
  parts: z.array(
    z.object({
      partId: idSchema,
      positionLabel: z.string(),
      before: z.number().nullable(),
      after: z.number().nullable(),
      details: z.array(
        z.object({
          detailId: idSchema,
          name: z.string(),
          before: z.number(),
          after: z.number(),
          recorded: z.number(),
          betweenLogs: z.number(),
        }),
      ),
      note: z.string().nullable(),
    }),
  ),
  /** null: may be posted; else why the buttons are disabled. */
  postDisabledReason: z.string().nullable(),
});
export type LogReviewDto = z.infer<typeof logReviewSchema>;

/** What columns of earlier logs were matched to, to offer the same again. */
export const rememberedMappingsSchema = z.object({
  items: z.array(z.object({ column: z.string(), unit: z.enum(LOAD_UNITS), positionId: idSchema })),
});
