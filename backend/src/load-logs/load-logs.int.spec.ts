import { createHash } from 'node:crypto';
import { readdir } from 'node:fs/promises';
import { join } from 'node:path';
import { Upload } from 'tus-js-client';
import { newId } from '../common/ids/new-id.js';
import { TestApp, type Agent } from '../testing/test-app.js';
import type { TestUser, TestVessel } from '../testing/factories.js';
import { LOG_STORAGE, type LogStorage } from '../storage/log-storage.js';
import { LogReceiver } from './log-receiver.js';

// Each test waits for real threads and a real database, on whatever else the machine is doing.
jest.setTimeout(60_000);

let app: TestApp;
let vessel: TestVessel;
let rigger: TestUser;
let agent: Agent;
let positionId: string;

beforeAll(async () => {
  app = await TestApp.create();
  // Ages of files are compared with the clock, and files get the machine's time.
  app.clock.setTo(new Date().toISOString());
  vessel = await app.make.vessel();
  rigger = await app.make.userOn(vessel, 'rigger', { firmId: vessel.firmId });
  agent = await app.signIn(rigger);
  positionId = (await app.make.position(vessel)).id;
});
afterAll(() => app?.close());

const BYTES = Buffer.from('time,load\n2026-06-01T00:00:00Z,1\n2026-06-01T00:00:01Z,2\n');

function announcement(override: Record<string, unknown> = {}) {
  return {
    fileName: 'log.csv',
    sizeBytes: BYTES.length,
    mapping: {
      time: { column: 'time', format: 'iso' },
      channels: [{ column: 'load', unit: 'kN', positionId }],
    },
    ...override,
  };
}

async function announce(override: Record<string, unknown> = {}): Promise<{ id: string; version: number }> {
  const reply = await agent.post(`/api/vessels/${vessel.id}/load-logs`).send(announcement(override));
  expect(reply.status).toBe(201);
  return reply.body;
}

function create(who: Agent, loadLogId: string, sizeBytes = BYTES.length) {
  return who.post('/api/uploads').set({
    'Tus-Resumable': '1.0.0',
    'Upload-Length': String(sizeBytes),
    'Upload-Metadata': `loadLogId ${Buffer.from(loadLogId).toString('base64')}`,
  });
}

function send(who: Agent, loadLogId: string, offset: number, bytes: Buffer) {
  return who
    .patch(`/api/uploads/${loadLogId}`)
    .set({
      'Tus-Resumable': '1.0.0',
      'Upload-Offset': String(offset),
      'Content-Type': 'application/offset+octet-stream',
    })
    .send(bytes);
}

function offsetOf(who: Agent, loadLogId: string) {
  return who.head(`/api/uploads/${loadLogId}`).set('Tus-Resumable', '1.0.0');
}

describe('uploads', () => {
  it('arrive in pieces, resume at the offset, and are kept byte by byte', async () => {
    const { id } = await announce();
    const created = await create(agent, id).expect(201);
    expect(created.headers.location).toBe(`/api/uploads/${id}`);
    await send(agent, id, 0, BYTES.subarray(0, 20)).expect(204);
    await send(agent, id, 7, BYTES.subarray(7)).expect(409);
    const head = await offsetOf(agent, id).expect(200);
    expect(head.headers['upload-offset']).toBe('20');
    const receiving = await agent.get(`/api/load-logs/${id}`).expect(200);
    expect(receiving.body).toMatchObject({ state: 'receiving', receivedBytes: 20, sha256: null });
    await send(agent, id, 20, BYTES.subarray(20)).expect(204);

    const received = await agent.get(`/api/load-logs/${id}`).expect(200);
    expect(received.body).toMatchObject({
      state: 'received',
      receivedBytes: BYTES.length,
      sha256: createHash('sha256').update(BYTES).digest('hex'),
      job: { kind: 'count-load-log', state: 'queued', progress: 0 },
    });
    const folder = join(app.env.STAYLEDGER_DATA, 'files', vessel.id);
    expect(await readdir(folder)).toContain(id);
    expect(await readdir(folder)).not.toContain(`${id}.part`);
  });

  it('come from the client library of the browser too', async () => {
    const bytes = Buffer.from(`time,load\n${'2026-06-01T00:00:00Z,1.25\n'.repeat(4000)}`);
    const { id } = await announce({ sizeBytes: bytes.length });
    const signIn = await app
      .agent()
      .post('/api/auth/sign-in')
      .send({ email: rigger.email, password: 'a long enough test password' });
    const cookie = String(signIn.headers['set-cookie']).split(';')[0];
    await new Promise<void>((resolve, reject) => {
      new Upload(bytes, {
        endpoint: `${app.url}/api/uploads`,
        chunkSize: 30_000,
        metadata: { loadLogId: id },
        headers: { Cookie: cookie, 'X-Requested-By': 'stayledger', 'Sec-Fetch-Site': 'same-origin' },
        onError: reject,
        onSuccess: () => resolve(),
      }).start();
    });
    const log = await agent.get(`/api/load-logs/${id}`).expect(200);
    expect(log.body).toMatchObject({ state: 'received', receivedBytes: bytes.length });
  });

  it('must be as long as announced', async () => {
    const { id } = await announce();
    const refused = await create(agent, id, BYTES.length + 1).expect(400);
    expect(JSON.parse(refused.text)).toMatchObject({ code: 'invalid-request' });
    await create(agent, id).expect(201);
    await send(agent, id, 0, Buffer.concat([BYTES, BYTES])).expect(413);
  });

  it('are refused to signed-out people, other firms, and pages of other sites', async () => {
    const { id } = await announce();
    await create(app.agent(), id).expect(401);
    const stranger = await app.signIn(await app.make.member('rigger'));
    const foreign = await create(stranger, id).expect(404);
    const absent = await create(stranger, newId()).expect(404);
    const text = (reply: { text: string }) => ({ ...JSON.parse(reply.text), requestId: '' });
    expect(text(foreign)).toEqual(text(absent));
    const insurer = await app.signIn(await app.make.userOn(vessel, 'insurer'));
    await create(insurer, id).expect(403);
    await create(agent, id).set('Sec-Fetch-Site', 'cross-site').expect(403);
    await create(agent, id).set('X-Requested-By', '').expect(403);
    await create(agent, '../../etc/passwd').expect(400);

    await create(agent, id).expect(201);
    await send(stranger, id, 0, BYTES).expect(404);
    await offsetOf(stranger, id).expect(404);
    await offsetOf(app.agent(), id).expect(401);
  });

  it('are told apart by contents, and what is no table is refused in words', async () => {
    const { id } = await announce({ fileName: 'honest.csv', sizeBytes: 8 });
    await create(agent, id, 8).expect(201);
    await send(agent, id, 0, Buffer.from('%PDF-1.7')).expect(204);
    const log = await agent.get(`/api/load-logs/${id}`).expect(200);
    expect(log.body).toMatchObject({ state: 'failed', failure: { code: 'not-a-table' }, job: null });
    expect(log.body.failure.message).toContain('PDF');
  });

  it('are taken over when the last step broke off', async () => {
    const { id } = await announce();
    await create(agent, id).expect(201);
    await send(agent, id, 0, BYTES).expect(204);
    // As after a crash between the file and the row.
    await app.database.admin.query(`delete from job where subject_id = $1`, [id]);
    await app.database.admin.query(
      `update load_log set state = 'receiving', sha256 = null, received_bytes = 0 where id = $1`,
      [id],
    );
    await app.nest.get(LogReceiver).sweep();
    const log = await agent.get(`/api/load-logs/${id}`).expect(200);
    expect(log.body).toMatchObject({ state: 'received', job: { state: 'queued' } });
  });

  it('are given up after seven days, and the bytes are cleared away', async () => {
    const { id } = await announce();
    await create(agent, id).expect(201);
    await send(agent, id, 0, BYTES.subarray(0, 10)).expect(204);
    app.clock.advance({ days: 8 });
    await app.nest.get(LogReceiver).sweep();
    agent = await app.signIn(rigger);
    const log = await agent.get(`/api/load-logs/${id}`).expect(200);
    expect(log.body).toMatchObject({ state: 'failed', failure: { code: 'upload-abandoned' } });
    expect(await readdir(join(app.env.STAYLEDGER_DATA, 'files', vessel.id))).not.toContain(`${id}.part`);
    const mapping = announcement().mapping;
    await agent.post(`/api/load-logs/${id}/recount`).send({ version: log.body.version, mapping }).expect(409);
  });

  it('that the device has no room for are refused before a byte is sent', async () => {
    const mib = 1024 ** 2;
    const storage = app.nest.get<LogStorage>(LOG_STORAGE);
    const free = jest.spyOn(storage, 'freeBytes').mockResolvedValue(300 * mib);
    try {
      const path = `/api/vessels/${vessel.id}/load-logs`;
      // Of the 300 MiB, 256 are kept for the rest of the service.
      await agent
        .post(path)
        .send(announcement({ sizeBytes: 43 * mib }))
        .expect(201);
      const refused = await agent
        .post(path)
        .send(announcement({ sizeBytes: 45 * mib }))
        .expect(507);
      expect(refused.body).toMatchObject({ code: 'storage-full' });
      expect(refused.body.message).toContain('.csv.gz');
    } finally {
      free.mockRestore();
    }
  });
});

describe('downloads', () => {
  it('give back the bytes, always as an attachment', async () => {
    const { id } = await announce({ fileName: 'Sjø "1".csv' });
    await agent.get(`/api/load-logs/${id}/file`).expect(409);
    await create(agent, id).expect(201);
    await send(agent, id, 0, BYTES).expect(204);
    const file = await agent.get(`/api/load-logs/${id}/file`).buffer(true).expect(200);
    expect(Buffer.from(file.body)).toEqual(BYTES);
    expect(file.headers).toMatchObject({
      'content-type': 'application/octet-stream',
      'x-content-type-options': 'nosniff',
      'content-length': String(BYTES.length),
    });
    expect(file.headers['content-disposition']).toMatch(/^attachment; /);
  });
});

describe('reach of logs', () => {
  it('is asked for at every route', async () => {
    const { id, version } = await announce();
    const stranger = await app.signIn(await app.make.member('surveyor'));
    const { mapping } = announcement();
    const routes = (
      logId: string,
      vesselId: string,
    ): [method: 'get' | 'post', path: string, body?: object][] => [
      ['get', `/api/vessels/${vesselId}/load-logs`],
      ['post', `/api/vessels/${vesselId}/load-logs`, announcement()],
      ['get', `/api/vessels/${vesselId}/channel-mappings`],
      ['get', `/api/load-logs/${logId}`],
      ['get', `/api/load-logs/${logId}/review`],
      ['get', `/api/load-logs/${logId}/file`],
      ['post', `/api/load-logs/${logId}/recount`, { version, mapping }],
      ['post', `/api/load-logs/${logId}/post`, { version }],
      ['post', `/api/load-logs/${logId}/set-aside`, { version, reason: 'no' }],
    ];
    const without = ({ body }: { body: object }) => ({ ...body, requestId: '' });
    const [own, absent] = [routes(id, vessel.id), routes(newId(), newId())];
    for (const [i, [method, path, body]] of own.entries()) {
      await app.agent()[method](path).send(body).expect(401);
      const foreign = await stranger[method](path).send(body).expect(404);
      const nowhere = await stranger[method](absent[i][1]).send(body).expect(404);
      expect(without(foreign)).toEqual(without(nowhere));
    }
    const insurer = await app.signIn(await app.make.userOn(vessel, 'insurer'));
    for (const [method, path, body] of own) await insurer[method](path).send(body).expect(403);
  });

  it('pages a list newest first', async () => {
    const ids: string[] = [];
    for (let i = 0; i < 3; i++) ids.push((await announce()).id);
    const first = await agent.get(`/api/vessels/${vessel.id}/load-logs?limit=2`).expect(200);
    expect(first.body.items.map(({ id }: { id: string }) => id)).toEqual([ids[2], ids[1]]);
    const next = `/api/vessels/${vessel.id}/load-logs?limit=2&cursor=${first.body.nextCursor}`;
    const second = await agent.get(next).expect(200);
    expect(second.body.items[0].id).toBe(ids[0]);
    await agent.get(`/api/vessels/${vessel.id}/load-logs?cursor=nonsense`).expect(400);
  });

  it('keeps a repeated announcement to one log', async () => {
    const key = newId();
    const path = `/api/vessels/${vessel.id}/load-logs`;
    const once = await agent.post(path).set('Idempotency-Key', key).send(announcement()).expect(201);
    const twice = await agent.post(path).set('Idempotency-Key', key).send(announcement()).expect(201);
    expect(twice.body.id).toBe(once.body.id);
  });
});
