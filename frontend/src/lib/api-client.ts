import { errorReplySchema } from '@stayledger/shared/contracts/errors';
import { ApiError, ReplyMismatchError, UnreachableError } from './api-error';
import { check, type Contract } from './contract';

type QueryValue = string | number | boolean | undefined | null;

/** Paths are given without the leading /api. */
export function apiUrl(path: string, query: Record<string, QueryValue> = {}): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query)) {
    if (value !== undefined && value !== null && value !== '') search.set(name, String(value));
  }
  const text = search.toString();
  return `/api${path}${text ? `?${text}` : ''}`;
}

export async function apiGet<Reply>(
  path: string,
  schema: Contract<Reply>,
  options: { query?: Record<string, QueryValue>; signal?: AbortSignal } = {},
): Promise<Reply> {
  const response = await send(apiUrl(path, options.query), { method: 'GET', signal: options.signal });
  return parseReply(path, schema, response);
}

export interface SendOptions {
  body?: unknown;
  /** For creating POSTs: one key per wish of the person, the same at every retry. See `newIdempotencyKey`. */
  idempotencyKey?: string;
}

/** Sends an unsafe request and parses the reply by the schema; leave the schema out where no body comes back. */
export async function apiSend(
  method: 'POST' | 'PUT' | 'PATCH' | 'DELETE',
  path: string,
  schema: null,
  options?: SendOptions,
): Promise<void>;
export async function apiSend<Reply>(
  method: 'POST' | 'PUT' | 'PATCH' | 'DELETE',
  path: string,
  schema: Contract<Reply>,
  options?: SendOptions,
): Promise<Reply>;
export async function apiSend(
  method: 'POST' | 'PUT' | 'PATCH' | 'DELETE',
  path: string,
  schema: Contract<unknown> | null,
  options: SendOptions = {},
): Promise<unknown> {
  const headers: Record<string, string> = { 'X-Requested-By': 'stayledger' };
  if (options.body !== undefined) headers['Content-Type'] = 'application/json';
  if (options.idempotencyKey) headers['Idempotency-Key'] = options.idempotencyKey;
  const response = await send(apiUrl(path), {
    method,
    headers,
    body: options.body === undefined ? undefined : JSON.stringify(options.body),
  });
  return schema ? parseReply(path, schema, response) : undefined;
}

export function newIdempotencyKey(): string {
  // randomUUID exists in secure contexts only; a service reached by plain HTTP on a local network has none.
  if (typeof crypto.randomUUID === 'function') return crypto.randomUUID();
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  bytes[6] = (bytes[6] & 0x0f) | 0x40;
  bytes[8] = (bytes[8] & 0x3f) | 0x80;
  const hex = Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
  return [hex.slice(0, 8), hex.slice(8, 12), hex.slice(12, 16), hex.slice(16, 20), hex.slice(20)].join('-');
}

async function send(url: string, init: RequestInit): Promise<Response> {
  let response: Response;
  try {
    response = await fetch(url, {
      ...init,
      credentials: 'same-origin',
      headers: { Accept: 'application/json', ...init.headers },
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new UnreachableError(error);
  }
  if (response.ok) return response;
  const envelope = errorReplySchema.safeParse(await bodyOf(response));
  if (envelope.success) throw new ApiError(response.status, envelope.data);
  // A proxy or a starting server answers without our envelope.
  throw new UnreachableError(new Error(`HTTP ${response.status} from ${url}`));
}

async function parseReply<Reply>(path: string, schema: Contract<Reply>, response: Response): Promise<Reply> {
  const checked = check(schema, await bodyOf(response));
  if (checked.ok) return checked.value;
  const [issue] = checked.issues;
  throw new ReplyMismatchError(
    path,
    `${issue?.path.join('.') || 'the whole'}: ${issue?.message ?? 'refused'}`,
  );
}

async function bodyOf(response: Response): Promise<unknown> {
  try {
    return await response.json();
  } catch {
    return undefined;
  }
}
