import { z } from 'zod';
import { curveSchema } from './curves.js';
import { ARTICULATIONS } from './parts.js';
import { idSchema, instantSchema, versionSchema } from './values.js';

/** Factors the rule knows: inspection in date; lapsed or hidden; hidden, never opened, its loss drops the mast. */
export const DESIGN_FATIGUE_FACTORS = [3, 5, 10] as const;

const curveVersionSchema = z.strictObject({ id: z.string().min(1).max(80), version: z.int().min(1) });

/** What a person decided about a detail; null leaves the default, and the default stays an estimate. */
const chosenFields = {
  curve: curveVersionSchema.nullable(),
  /** Of the end, for terminals. */
  articulation: z.enum(ARTICULATIONS).nullable(),
  designFatigueFactor: z
    .number()
    .refine((value) => (DESIGN_FATIGUE_FACTORS as readonly number[]).includes(value), {
      error: 'Choose 3, 5 or 10.',
    })
    .nullable(),
};
export const previewDetailChoiceSchema = z.strictObject(chosenFields);
export type PreviewDetailChoiceInput = z.infer<typeof previewDetailChoiceSchema>;

export const chooseDetailSchema = z.strictObject({
  /** Of the choice that is replaced; absent for the first. */
  version: versionSchema.optional(),
  ...chosenFields,
  evidence: z
    .string()
    .trim()
    .min(1, 'Say what this rests on: a certificate, a measurement, a photograph, a test.')
    .max(2000),
});
export type ChooseDetailInput = z.infer<typeof chooseDetailSchema>;

/** What a choice would do, worked out without writing anything. */
export const detailChoiceEffectSchema = z.object({
  /** Allowance used of this detail; null where it is not assessed or nothing was logged. */
  before: z.number().nullable(),
  after: z.number().nullable(),
  /** Entries that would be reversed, each by a further entry, and written anew. */
  entriesReversed: z.int(),
  explanation: z.string(),
  estimates: z.array(z.string()),
});
export type DetailChoiceEffectDto = z.infer<typeof detailChoiceEffectSchema>;

export const detailChoiceSchema = z.object({
  ...chosenFields,
  evidence: z.string(),
  confirmedByName: z.string(),
  confirmedAt: instantSchema,
  version: versionSchema,
});
export type DetailChoiceDto = z.infer<typeof detailChoiceSchema>;

/** The details of a part with what stands by default and what was decided instead. */
export const detailChoicesSchema = z.object({
  partId: idSchema,
  items: z.array(
    z.object({
      key: z.string(),
      name: z.string(),
      /** As used now. */
      curve: z.object({ id: z.string(), version: z.int(), name: z.string() }).nullable(),
      designFatigueFactor: z.number(),
      explanation: z.string(),
      estimates: z.array(z.string()),
      notAssessedReason: z.string().nullable(),
      /** True for ends, which may turn. */
      hasArticulation: z.boolean(),
      choice: detailChoiceSchema.nullable(),
      /** Curves of the same measure that may be chosen, in their newest version. */
      curves: z.array(
        curveSchema.pick({
          id: true,
          version: true,
          name: true,
          appliesTo: true,
          environment: true,
          provenance: true,
        }),
      ),
    }),
  ),
});
export type DetailChoicesDto = z.infer<typeof detailChoicesSchema>;
export type DetailWithChoiceDto = DetailChoicesDto['items'][number];
