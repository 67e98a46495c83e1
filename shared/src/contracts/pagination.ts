import { z } from 'zod';

export const PAGE_LIMIT_MAX = 200;

/** Keyset paging: `cursor` is opaque, from the page before. */
export const pageQuerySchema = z.strictObject({
  cursor: z.string().max(500).optional(),
  limit: z.coerce.number().int().min(1).max(PAGE_LIMIT_MAX).default(50),
});

/** `{ items, nextCursor }`; nextCursor is null on the last page. */
export function pageOf<T extends z.ZodType>(item: T) {
  return z.object({ items: z.array(item), nextCursor: z.string().nullable() });
}
