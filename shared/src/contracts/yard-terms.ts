import { z } from 'zod';
import { daySchema, idSchema, versionSchema } from './values.js';

/** Kinds of visit: with the mast up; mast out, vessel afloat or ashore. */
export const VISIT_KINDS = ['aloft', 'mast-out-afloat', 'mast-out-ashore'] as const;

/** Money is in whole minor units of the firm's currency (cents). */
const moneySchema = z.int().min(0, 'A cost cannot be less than nothing.').max(1_000_000_000);
const hoursSchema = z.number().min(0).max(10_000);
const daysSchema = z.int().min(0).max(1000);
const yearDaySchema = z
  .string()
  .regex(/^(0[1-9]|1[0-2])-(0[1-9]|[12]\d|3[01])$/, 'Give month and day, such as 03-01.')
  .refine((day) => !/^(02-3|0[469]-31|11-31)/.test(day), 'That month has no such day.');

export const workTermsSchema = z.strictObject({ costMinor: moneySchema, hours: hoursSchema });
const visitTermsSchema = z.strictObject({
  costMinor: moneySchema.min(1, 'A visit must cost more than nothing.'),
  hours: hoursSchema,
});
const replacementTermsSchema = z.strictObject({
  perPartMinor: moneySchema,
  perMetreMillimetreMinor: moneySchema,
  hours: hoursSchema,
  leadDays: daysSchema,
  aloft: z.boolean(),
});

/** A stretch of days, both included. */
export const daySpanSchema = z
  .strictObject({ fromOn: daySchema, untilOn: daySchema, reason: z.string().trim().max(120).default('') })
  .refine(({ fromOn, untilOn }) => untilOn >= fromOn, {
    message: 'This ends before it begins.',
    path: ['untilOn'],
  });

export const yardTermsSchema = z.strictObject({
  visits: z.strictObject({
    aloft: visitTermsSchema,
    'mast-out-afloat': visitTermsSchema,
    'mast-out-ashore': visitTermsSchema,
  }),
  contingencyShare: z.number().min(0).max(1, 'The contingency is a share of the bill: 100 % at most.'),
  orderMarginDays: daysSchema,
  replacements: z.strictObject({
    strand: replacementTermsSchema,
    rod: replacementTermsSchema,
    fibre: replacementTermsSchema,
  }),
  inspection: workTermsSchema,
  /** 0: inspections are not planned. */
  inspectionEveryMonths: z.int().min(0).max(240),
  seasons: z
    .array(
      z.strictObject({
        id: z.string().regex(/^[a-z0-9-]{1,30}$/),
        name: z.string().trim().min(1, 'Give the season a name.').max(40),
        fromDay: yearDaySchema,
        untilDay: yearDaySchema,
        berths: z.int().min(0).max(1000),
        hours: hoursSchema,
      }),
    )
    .min(1, 'A yard without a season can take nobody.')
    .max(6)
    .refine(
      (seasons) => new Set(seasons.map(({ id }) => id)).size === seasons.length,
      'Two seasons are one.',
    ),
  closures: z.array(daySpanSchema).max(60),
});
export type YardTermsInput = z.input<typeof yardTermsSchema>;

export const stateYardTermsSchema = z.strictObject({
  /** Absent while the firm still has the terms to start from. */
  version: versionSchema.optional(),
  terms: yardTermsSchema,
});
export type StateYardTermsInput = z.input<typeof stateYardTermsSchema>;

/** `version` is null while nobody has stated terms of the firm's own. */
export const yardTermsReplySchema = z.object({
  firmId: idSchema,
  firmName: z.string(),
  currency: z.string(),
  terms: yardTermsSchema,
  version: versionSchema.nullable(),
});
export type YardTermsDto = z.infer<typeof yardTermsReplySchema>;
