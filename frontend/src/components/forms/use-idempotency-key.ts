import { useRef } from 'react';
import { newIdempotencyKey } from '../../lib/api-client';

/** One key for one wish: sending the same body again keeps the key, a changed body gets a new one. */
export function useIdempotencyKey(): (body: unknown) => string {
  const last = useRef<{ body: string; key: string } | null>(null);
  return (body) => {
    const text = JSON.stringify(body);
    if (last.current?.body !== text) last.current = { body: text, key: newIdempotencyKey() };
    return last.current.key;
  };
}
