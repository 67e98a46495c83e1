import { z } from 'zod';
import { curveSchema } from './curves.js';
import { idSchema } from './values.js';

/** The free length of a part on every strand curve of the reference data, on one and the same recorded history. */
export const curveSpreadSchema = z.object({
  partId: idSchema,
  loggedHours: z.number(),
  designFatigueFactor: z.number(),
  /** Empty for rod and fibre, and where nothing was logged. */
  items: z.array(
    z.object({
      curveId: z.string(),
      curveVersion: z.int(),
      curveName: z.string(),
      level: curveSchema.shape.level,
      /** The curve the account of this part is kept on. */
      isUsed: z.boolean(),
      /** Damage of the logged history times the design fatigue factor. */
      allowance: z.number(),
    }),
  ),
});
export type CurveSpreadDto = z.infer<typeof curveSpreadSchema>;
