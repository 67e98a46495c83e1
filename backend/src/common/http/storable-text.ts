import type { RequestHandler } from 'express';
import { InvalidRequestError } from '../errors/app-error.js';

/** Deeper than any contract; a body nested without end would exhaust the stack of whatever walks it. */
const DEPTH_MAX = 32;
const UNSTORABLE = 'This holds a character that cannot be stored. Type it again.';

/**
 * Refuses text that no database stores, at its field: a NUL, or half of a character of two halves. Such text comes from
 * programs, never from a keyboard, and would otherwise be reported as an accident of the service.
 */
export const storableText: RequestHandler = (request, _response, next) => {
  const fieldErrors = { ...troublesIn(request.body), ...troublesIn(request.query) };
  if (Object.keys(fieldErrors).length === 0) return next();
  next(new InvalidRequestError(fieldErrors));
};

function troublesIn(root: unknown): Record<string, string[]> {
  const troubles: Record<string, string[]> = {};
  const waiting: { value: unknown; path: string; depth: number }[] = [{ value: root, path: '', depth: 0 }];
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    const { value, path, depth } = next;
    if (typeof value === 'string') {
      if (!isStorable(value)) troubles[path] = [UNSTORABLE];
    } else if (typeof value === 'object' && value !== null) {
      if (depth === DEPTH_MAX)
        return { [path.split('.')[0]]: [`This is nested more than ${DEPTH_MAX} deep.`] };
      for (const [key, inner] of Object.entries(value)) {
        if (!isStorable(key)) return { [path]: ['The name of an entry cannot be stored.'] };
        waiting.push({ value: inner, path: path === '' ? key : `${path}.${key}`, depth: depth + 1 });
      }
    }
  }
  return troubles;
}

function isStorable(text: string): boolean {
  return !text.includes('\0') && !/\p{Surrogate}/u.test(text);
}
