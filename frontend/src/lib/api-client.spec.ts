import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { describe, expect, it, vi } from 'vitest';
import { sampleSession } from '../testing/samples';
import { apiGet, apiSend, apiUrl, newIdempotencyKey } from './api-client';
import { ApiError, ReplyMismatchError, UnreachableError } from './api-error';

function answer(body: unknown, status = 200) {
  const calls: RequestInit[] = [];
  vi.stubGlobal('fetch', async (_url: string, init: RequestInit) => {
    calls.push(init);
    return new Response(typeof body === 'string' ? body : JSON.stringify(body), { status });
  });
  return calls;
}

describe('the API client', () => {
  it('leaves empty query values out', () => {
    expect(apiUrl('/vessels', { q: '', sort: 'due', cursor: undefined, limit: 50 })).toBe(
      '/api/vessels?sort=due&limit=50',
    );
  });

  it('gives back a reply that keeps the contract', async () => {
    const session = sampleSession('owner');
    answer(session);
    await expect(apiGet('/auth/session', sessionSchema)).resolves.toEqual(session);
  });

  it('names the place where a reply breaks the contract', async () => {
    answer({ ...sampleSession('owner'), permissions: ['fly'] });
    await expect(apiGet('/auth/session', sessionSchema)).rejects.toThrow(ReplyMismatchError);
    await expect(apiGet('/auth/session', sessionSchema)).rejects.toThrow(/permissions\.0/);
  });

  it('marks unsafe requests as its own and carries the key of the wish', async () => {
    const calls = answer(sampleSession('owner'));
    await apiSend('POST', '/x', sessionSchema, { body: { a: 1 }, idempotencyKey: 'key' });
    const headers = new Headers(calls[0].headers);
    expect(headers.get('X-Requested-By')).toBe('stayledger');
    expect(headers.get('Idempotency-Key')).toBe('key');
    expect(headers.get('Content-Type')).toBe('application/json');
    expect(calls[0].credentials).toBe('same-origin');
  });

  it('turns the error envelope into an error with its code, fields and current state', async () => {
    answer(
      {
        code: 'version-conflict',
        message: 'Changed meanwhile.',
        fieldErrors: { name: ['Too long.'] },
        current: { version: 3 },
        requestId: 'r1',
      },
      409,
    );
    const refused = await apiSend('PATCH', '/x', null, { body: {} }).catch((error: unknown) => error);
    expect(refused).toBeInstanceOf(ApiError);
    expect(refused).toMatchObject({
      status: 409,
      code: 'version-conflict',
      message: 'Changed meanwhile.',
      fieldErrors: { name: ['Too long.'] },
      current: { version: 3 },
      requestId: 'r1',
    });
  });

  it('says that the server is out of reach when a proxy answers in its place', async () => {
    answer('<html>Bad gateway</html>', 502);
    await expect(apiGet('/x', sessionSchema)).rejects.toThrow(UnreachableError);
    vi.stubGlobal('fetch', async () => {
      throw new TypeError('Failed to fetch');
    });
    await expect(apiGet('/x', sessionSchema)).rejects.toThrow(/could not be reached/);
  });

  it('makes keys of version 4, also where the page is not a secure context', () => {
    const shape = /^[0-9a-f]{8}-[0-9a-f]{4}-4[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/;
    expect(newIdempotencyKey()).toMatch(shape);
    const getRandomValues = crypto.getRandomValues.bind(crypto);
    vi.stubGlobal('crypto', { getRandomValues });
    const keys = new Set(Array.from({ length: 50 }, newIdempotencyKey));
    expect(keys.size).toBe(50);
    for (const key of keys) expect(key).toMatch(shape);
  });
});
