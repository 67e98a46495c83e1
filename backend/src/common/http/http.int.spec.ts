import { mkdtempSync, mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { request as rawRequest, type IncomingHttpHeaders } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { brotliCompressSync, brotliDecompressSync } from 'node:zlib';
import { Controller, Get, Post, Res } from '@nestjs/common';
import type { Response } from 'express';
import supertest from 'supertest';
import { Public } from '../../auth/access.decorators.js';
import { TestApp, type Agent } from '../../testing/test-app.js';

const SCRIPT = 'console.log("a script long enough to be worth compressing, a script long enough")';
let app: TestApp;
let agent: Agent;
let folder: string;
let secret: string;

@Controller('accidents')
class AccidentsController {
  @Get('plain')
  @Public()
  plain(): never {
    throw new Error('a detail nobody should see');
  }

  @Get('database')
  @Public()
  database(): never {
    throw Object.assign(new Error('connect ECONNREFUSED 127.0.0.1:5432'), { code: 'ECONNREFUSED' });
  }

  @Get('half')
  @Public()
  half(@Res() response: Response): never {
    response.write('the first half');
    throw new Error('the second half is missing');
  }

  @Post('echo')
  @Public()
  echo() {
    return { ok: true };
  }
}

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'stayledger-web-'));
  secret = join(folder, '../stayledger-secret.txt');
  mkdirSync(join(folder, 'assets'));
  writeFileSync(join(folder, 'index.html'), '<meta property="csp-nonce" nonce="__CSP_NONCE__">');
  writeFileSync(join(folder, 'icon.svg'), '<svg xmlns="http://www.w3.org/2000/svg"/>');
  writeFileSync(join(folder, 'assets/app-0a1b.js'), SCRIPT);
  writeFileSync(join(folder, 'assets/app-0a1b.js.br'), brotliCompressSync(SCRIPT));
  writeFileSync(secret, 'not for the web');
  app = await TestApp.create({
    webAppFolder: folder,
    imports: [{ module: class Accidents {}, controllers: [AccidentsController] }],
  });
  agent = await app.signIn(await app.make.member('rigger'));
});
afterAll(async () => {
  await app?.close();
  rmSync(folder, { recursive: true, force: true });
  rmSync(secret, { force: true });
});

describe('errors', () => {
  it('of ours tell nothing about the accident, and leave an id to find it by', async () => {
    const reply = await app.agent().get('/api/accidents/plain').expect(500);
    expect(reply.body).toEqual({
      code: 'internal',
      message: expect.any(String),
      requestId: reply.headers['x-request-id'],
    });
    expect(reply.text).not.toContain('nobody should see');
  });

  it('of a database that is away are 503 and say when to come back', async () => {
    const reply = await app.agent().get('/api/accidents/database').expect(503);
    expect(reply.body.code).toBe('unavailable');
    expect(Number(reply.headers['retry-after'])).toBeGreaterThan(0);
  });

  it('after half a reply cut the connection instead of pretending', async () => {
    await expect(app.agent().get('/api/accidents/half')).rejects.toThrow(/aborted|hang up/);
  });

  it('name an address that is none, without a page', async () => {
    const reply = await agent.get('/api/nothing-here').expect(404);
    expect(reply.body.code).toBe('not-found');
  });

  it('tell broken JSON from a body of another kind and from one too long', async () => {
    const post = () => agent.post('/api/vessels');
    const broken = await post().set('Content-Type', 'application/json').send('{"name":').expect(400);
    expect(broken.body.code).toBe('invalid-request');
    const form = await post().type('form').send({ name: 'Skarv' }).expect(415);
    expect(form.body.code).toBe('unsupported-media-type');
    const long = await post()
      .send({ notes: 'x'.repeat(300_000) })
      .expect(413);
    expect(long.body.code).toBe('payload-too-large');
  });
});

describe('cross-site requests', () => {
  const echo = '/api/accidents/echo';

  it('are refused by where the browser says they come from', async () => {
    const bare = supertest(app.url);
    for (const site of ['cross-site', 'same-site', 'none']) {
      const reply = await bare
        .post(echo)
        .set({ 'Sec-Fetch-Site': site, 'X-Requested-By': 'stayledger' })
        .expect(403);
      expect(reply.body.code).toBe('cross-site');
    }
    await bare
      .post(echo)
      .set({ 'Sec-Fetch-Site': 'same-origin', 'X-Requested-By': 'stayledger' })
      .expect(201);
  });

  it('are refused by their origin where the browser does not say', async () => {
    const bare = supertest(app.url);
    await bare
      .post(echo)
      .set({ Origin: 'https://elsewhere.example', 'X-Requested-By': 'stayledger' })
      .expect(403);
    await bare.post(echo).set({ 'X-Requested-By': 'stayledger' }).expect(403);
    await bare.post(echo).set({ Origin: app.url, 'X-Requested-By': 'stayledger' }).expect(201);
  });

  it('are refused without the header that only our pages can add', async () => {
    const reply = await supertest(app.url).post(echo).set({ 'Sec-Fetch-Site': 'same-origin' }).expect(403);
    expect(reply.body.code).toBe('cross-site');
  });

  it('may read, since reading changes nothing and the reply stays out of their reach', async () => {
    const reply = await supertest(app.url)
      .get('/api/auth/session')
      .set({ 'Sec-Fetch-Site': 'cross-site' })
      .expect(200);
    expect(reply.headers['access-control-allow-origin']).toBeUndefined();
  });
});

describe('headers', () => {
  it('let no foreign script, frame or guess in, and demand no TLS where there is none', async () => {
    const { headers } = await app.agent().get('/').expect(200);
    const policy = headers['content-security-policy'];
    expect(policy).toContain(`script-src 'self';`);
    expect(policy).toContain(`frame-ancestors 'none'`);
    expect(policy).not.toContain('unsafe');
    expect(policy).not.toContain('upgrade-insecure-requests');
    expect(headers['strict-transport-security']).toBeUndefined();
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['x-powered-by']).toBeUndefined();
  });

  it('keep replies of the API out of every cache', async () => {
    const { headers } = await agent.get('/api/vessels').expect(200);
    expect(headers['cache-control']).toBe('no-store');
  });

  it('promise a TLS-only cookie and service behind TLS', async () => {
    const behindTls = await TestApp.create({
      env: { PUBLIC_URL: 'https://rigs.example', TRUST_PROXY: '1' },
      webAppFolder: folder,
    });
    try {
      const person = await behindTls.make.person();
      const { headers } = await supertest(behindTls.url)
        .post('/api/auth/sign-in')
        .set({
          Origin: 'https://rigs.example',
          'X-Requested-By': 'stayledger',
          'X-Forwarded-Proto': 'https',
        })
        .send({ email: person.email, password: 'a long enough test password' })
        .expect(200);
      expect(headers['set-cookie'][0]).toMatch(/^__Host-sid=.*; Secure/);
      expect(headers['strict-transport-security']).toMatch(/max-age=\d{8}/);
      expect(headers['content-security-policy']).toContain('upgrade-insecure-requests');
    } finally {
      await behindTls.close();
    }
  });
});

describe('the web application', () => {
  it('is one page for every address, never stored, with a fresh nonce that its policy allows', async () => {
    const nonces = [];
    for (const path of ['/', '/vessels/1/rig', '/index.html']) {
      const reply = await app.agent().get(path).expect(200);
      expect(reply.headers['cache-control']).toBe('no-store');
      const nonce = /nonce="([^"]+)"/.exec(reply.text)?.[1];
      expect(reply.headers['content-security-policy']).toContain(`'nonce-${nonce}'`);
      nonces.push(nonce);
    }
    expect(new Set(nonces).size).toBe(3);
  });

  it('sends hashed files for a year, compressed where the build made a twin', async () => {
    const compressed = await raw('/assets/app-0a1b.js', { 'Accept-Encoding': 'br' });
    expect(compressed.headers['content-encoding']).toBe('br');
    expect(compressed.headers['cache-control']).toBe('public, max-age=31536000, immutable');
    expect(compressed.headers['content-type']).toMatch(/javascript/);
    expect(compressed.headers.vary).toContain('Accept-Encoding');
    expect(brotliDecompressSync(compressed.bytes).toString()).toBe(SCRIPT);
    const plain = await raw('/assets/app-0a1b.js', { 'Accept-Encoding': 'identity' });
    expect(plain.headers['content-encoding']).toBeUndefined();
    expect(plain.body).toBe(SCRIPT);
  });

  it('lets other files be asked for again after an hour', async () => {
    const { headers } = await app.agent().get('/icon.svg').expect(200);
    expect(headers['cache-control']).toBe('public, max-age=3600');
  });

  it('answers 404 for an asset of an older build, not the page', async () => {
    await app.agent().get('/assets/app-gone.js').expect(404);
  });

  it('gives nothing from outside its folder', async () => {
    for (const path of [
      '/../stayledger-secret.txt',
      '/%2e%2e/stayledger-secret.txt',
      '/assets/..%2f..%2fstayledger-secret.txt',
      '/%00',
      '/%zz',
    ]) {
      const { status, body } = await raw(path);
      expect(body).not.toContain('not for the web');
      expect(status).toBeLessThan(500);
    }
  });

  it('leaves changes alone', async () => {
    await app.agent().post('/vessels').expect(404);
  });
});

interface RawReply {
  status: number;
  headers: IncomingHttpHeaders;
  bytes: Buffer;
  body: string;
}

/** Sends the path as it is and takes the bytes as they come; clients tidy up paths and unpack replies. */
function raw(path: string, headers: Record<string, string> = {}): Promise<RawReply> {
  return new Promise((resolve, reject) => {
    const { hostname, port } = new URL(app.url);
    rawRequest({ hostname, port, path, headers }, (response) => {
      const chunks: Buffer[] = [];
      response.on('data', (chunk: Buffer) => chunks.push(chunk));
      response.on('end', () => {
        const bytes = Buffer.concat(chunks);
        resolve({
          status: response.statusCode ?? 0,
          headers: response.headers,
          bytes,
          body: bytes.toString(),
        });
      });
    })
      .on('error', reject)
      .end();
  });
}

describe('the API document', () => {
  it('is for people who are signed in', async () => {
    await app.agent().get('/api/openapi.json').expect(401);
    await app.agent().get('/api/docs').expect(401);
    await app.agent().get('/api/docs/openapi.yaml').expect(401);
  });

  it('names routes, contracts and limits', async () => {
    const { body } = await agent.get('/api/openapi.json').expect(200);
    expect(body.paths).toHaveProperty('/api/vessels');
    const { properties } = body.components.schemas.CreateVesselBody;
    expect(properties.name).toMatchObject({ type: 'string', maxLength: 120 });
    expect(properties.buildYear).not.toHaveProperty('type', 'array');
  });

  it('is a page that its own policy lets work', async () => {
    const reply = await agent.get('/api/docs').expect(200);
    expect(reply.text).toContain('swagger-ui');
    expect(reply.headers['content-security-policy']).toContain(`style-src 'self' 'unsafe-inline'`);
    expect(reply.headers['content-security-policy']).not.toContain(`script-src 'unsafe`);
  });
});
