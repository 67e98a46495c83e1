import { TEST_PASSWORD } from '@stayledger/backend/testing/factories';
import { pause } from './service-process.js';

const GIVE_UP_MS = 180_000;
const REPLY_WITHIN_MS = 30_000;

export interface Reply {
  status: number;
  headers: Headers;
  body: unknown;
}

interface Request {
  method: string;
  path: string;
  json?: unknown;
  bytes?: Buffer;
  headers?: Record<string, string>;
}

/** A client that outlives the service: it keeps its cookie, and asks again when nobody answered. */
export class PatientClient {
  private cookie = '';
  /** Replies the service must not give, whatever was killed. */
  readonly oddReplies: string[] = [];
  /** Requests that were answered by 503 or by nobody. */
  unanswered = 0;

  constructor(private readonly url: string) {}

  async signIn(email: string): Promise<void> {
    const reply = await this.ask({
      method: 'POST',
      path: '/api/auth/sign-in',
      json: { email, password: TEST_PASSWORD },
    });
    if (reply.status !== 200) throw new Error(`sign-in: ${JSON.stringify(reply)}`);
    this.cookie = (reply.headers.get('set-cookie') ?? '').split(';')[0];
  }

  /** Asks until the service answers with something else than being away. */
  async ask(request: Request): Promise<Reply> {
    const deadline = performance.now() + GIVE_UP_MS;
    for (;;) {
      const reply = await this.askOnce(request);
      if (reply !== null) return reply;
      if (performance.now() > deadline) throw new Error(`${request.method} ${request.path}: nobody answers`);
      await pause(100);
    }
  }

  /** One try; null when nobody answered, or the service said that it is away. */
  async askOnce({ method, path, json, bytes, headers = {} }: Request): Promise<Reply | null> {
    try {
      const response = await fetch(this.url + path, {
        method,
        headers: {
          'Sec-Fetch-Site': 'same-origin',
          'X-Requested-By': 'stayledger',
          ...(this.cookie ? { Cookie: this.cookie } : {}),
          ...(json === undefined ? {} : { 'Content-Type': 'application/json' }),
          ...headers,
        },
        body: json === undefined ? (bytes ? new Uint8Array(bytes) : undefined) : JSON.stringify(json),
        signal: AbortSignal.timeout(REPLY_WITHIN_MS),
      });
      const text = await response.text();
      if (response.status === 503 || response.status === 429) {
        if (response.headers.get('retry-after') === null) {
          this.oddReplies.push(`${method} ${path}: ${response.status} without Retry-After`);
        }
        this.unanswered += 1;
        return null;
      }
      if (response.status >= 500) this.oddReplies.push(`${method} ${path}: ${response.status} ${text}`);
      const isJson = response.headers.get('content-type')?.includes('json') ?? false;
      return { status: response.status, headers: response.headers, body: isJson ? JSON.parse(text) : text };
    } catch {
      this.unanswered += 1;
      return null;
    }
  }
}
