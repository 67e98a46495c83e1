import { errorReplySchema, type ErrorCode } from '@stayledger/shared/contracts/errors';
import { afterEach, expect, vi } from 'vitest';
import { check, type Contract } from '../lib/contract';

export interface FakeRequest {
  method: string;
  /** Path without /api, such as `/vessels`. */
  path: string;
  query: URLSearchParams;
  headers: Headers;
  body: unknown;
}

export interface FakeReply {
  status: number;
  body: unknown;
}

type Route = (request: FakeRequest) => FakeReply;

/** A reply that keeps the contract; a sample that does not is a fault of the spec and fails it. */
export function reply<Output>(schema: Contract<Output>, body: NoInfer<Output>, status = 200): FakeReply {
  const checked = check(schema, body);
  if (!checked.ok) throw new Error(`The sample breaks its contract: ${JSON.stringify(checked.issues)}`);
  return { status, body: checked.value };
}

export function noContent(): FakeReply {
  return { status: 204, body: undefined };
}

export function refusal(
  status: number,
  code: ErrorCode,
  message: string,
  more: { fieldErrors?: Record<string, string[]>; current?: unknown } = {},
): FakeReply {
  return {
    status,
    body: errorReplySchema.parse({
      code,
      message,
      requestId: '0193f1d2-0000-7000-8000-00000000abcd',
      ...more,
    }),
  };
}

let problems: string[] = [];
afterEach(() => {
  const found = problems;
  problems = [];
  expect(found).toEqual([]);
});

/**
 * Answers `fetch` from a table of routes ("GET /vessels/:vesselId"). An address that is not in the table, an unsafe
 * request without its header and a body that breaks the request contract all fail the spec.
 */
export function fakeApi(
  routes: Record<string, FakeReply | Route>,
  requestContracts: Record<string, Contract<unknown>> = {},
): { requests: FakeRequest[] } {
  const requests: FakeRequest[] = [];
  vi.stubGlobal('fetch', async (input: string | URL, init: RequestInit = {}) => {
    const url = new URL(String(input), 'http://localhost');
    const request: FakeRequest = {
      method: init.method ?? 'GET',
      path: url.pathname.replace(/^\/api/, ''),
      query: url.searchParams,
      headers: new Headers(init.headers),
      body: typeof init.body === 'string' ? JSON.parse(init.body) : undefined,
    };
    requests.push(request);
    const key = Object.keys(routes).find((candidate) => matches(candidate, request));
    if (!key) {
      problems.push(`No fake route for ${request.method} ${request.path}`);
      throw new TypeError('no route');
    }
    if (request.method !== 'GET' && request.headers.get('X-Requested-By') !== 'stayledger') {
      problems.push(`${request.method} ${request.path} went out without X-Requested-By`);
    }
    const contract = requestContracts[key];
    const checked = contract ? check(contract, request.body) : null;
    if (checked && !checked.ok) problems.push(`${key} broke its contract: ${JSON.stringify(checked.issues)}`);
    const route = routes[key];
    const answer = typeof route === 'function' ? route(request) : route;
    const hasBody = answer.body !== undefined;
    return new Response(hasBody ? JSON.stringify(answer.body) : null, {
      status: answer.status,
      headers: hasBody ? { 'Content-Type': 'application/json' } : {},
    });
  });
  return { requests };
}

function matches(key: string, request: FakeRequest): boolean {
  const [method, pattern] = key.split(' ');
  if (method !== request.method) return false;
  const wanted = pattern.split('/');
  const given = request.path.split('/');
  return (
    wanted.length === given.length && wanted.every((part, i) => part.startsWith(':') || part === given[i])
  );
}
