import { z } from 'zod';

/** Codes a client may switch on. The message says what is wrong and what mends it. */
export const ERROR_CODES = [
  'invalid-request',
  'signed-out',
  'wrong-credentials',
  'too-many-attempts',
  'forbidden',
  'cross-site',
  'not-found',
  'version-conflict',
  'state-conflict',
  'duplicate',
  'idempotency-mismatch',
  'payload-too-large',
  'unsupported-media-type',
  'storage-full',
  'unavailable',
  'internal',
] as const;
export type ErrorCode = (typeof ERROR_CODES)[number];

/** The one error envelope of the API. `current` carries the stored state on a version conflict. */
export const errorReplySchema = z.object({
  code: z.enum(ERROR_CODES),
  message: z.string(),
  fieldErrors: z.record(z.string(), z.array(z.string())).optional(),
  current: z.unknown().optional(),
  requestId: z.string(),
});
export type ErrorReply = z.infer<typeof errorReplySchema>;
