import type { z } from 'zod';
import { InvalidRequestError } from '../errors/app-error.js';

/** A page of a list. `nextCursor` is null on the last one. */
export interface Page<T> {
  items: T[];
  nextCursor: string | null;
}

/** The sort values of the last row of a page, in a form clients pass back without looking inside. */
export function encodeCursor(values: readonly (string | number | null)[]): string {
  return Buffer.from(JSON.stringify(values)).toString('base64url');
}

/** @throws InvalidRequestError for a cursor that this list did not give out */
export function decodeCursor<T extends z.ZodType>(cursor: string | undefined, schema: T): z.infer<T> | null {
  if (cursor === undefined) return null;
  let values: unknown;
  try {
    values = JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'));
  } catch {
    values = undefined;
  }
  const parsed = schema.safeParse(values);
  if (parsed.success) return parsed.data;
  throw new InvalidRequestError({ cursor: ['Not a cursor of this list. Start again without one.'] });
}

/** Makes a page of rows fetched with one row more than asked for. */
export function toPage<Row>(
  rows: readonly Row[],
  limit: number,
  keyOf: (row: Row) => readonly (string | number | null)[],
): { rows: Row[]; nextCursor: string | null } {
  const page = rows.slice(0, limit);
  const last = page.at(-1);
  return {
    rows: page,
    nextCursor: rows.length > limit && last !== undefined ? encodeCursor(keyOf(last)) : null,
  };
}
