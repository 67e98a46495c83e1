import { rm, symlink, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { TestVessel } from '../testing/factories.js';
import { TestApp, type Agent } from '../testing/test-app.js';

const BYTES = Buffer.from('time,load\n2026-06-01T00:00:00Z,1\n2026-06-01T00:00:01Z,2\n');
const TUS = { 'Tus-Resumable': '1.0.0' };

describe('a device without room', () => {
  let app: TestApp;
  let vessel: TestVessel;
  let agent: Agent;
  let positionId: string;

  beforeAll(async () => {
    app = await TestApp.create();
    vessel = await app.make.vessel();
    agent = await app.signIn(await app.make.userOn(vessel, 'rigger', { firmId: vessel.firmId }));
    positionId = (await app.make.position(vessel)).id;
  });
  afterAll(() => app?.close());

  async function begun(): Promise<string> {
    const announced = await agent.post(`/api/vessels/${vessel.id}/load-logs`).send({
      fileName: 'log.csv',
      sizeBytes: BYTES.length,
      mapping: {
        time: { column: 'time', format: 'iso' },
        channels: [{ column: 'load', unit: 'kN', positionId }],
      },
    });
    const id: string = announced.body.id;
    await agent
      .post('/api/uploads')
      .set({
        ...TUS,
        'Upload-Length': String(BYTES.length),
        'Upload-Metadata': `loadLogId ${Buffer.from(id).toString('base64')}`,
      })
      .expect(201);
    return id;
  }

  const send = (id: string, offset: number, bytes: Buffer) =>
    agent
      .patch(`/api/uploads/${id}`)
      .set({ ...TUS, 'Upload-Offset': String(offset), 'Content-Type': 'application/offset+octet-stream' })
      .send(bytes);

  it('is said in words, keeps what arrived, leaves others alone, and takes the rest once there is room', async () => {
    const id = await begun();
    const other = await begun();
    const part = join(app.env.STAYLEDGER_DATA, 'files', vessel.id, `${id}.part`);
    // The kernel's own device that is always full: writing to it fails as on a full disk (ENOSPC).
    await rm(part);
    await symlink('/dev/full', part);
    const refused = await send(id, 0, BYTES).expect(507);
    expect(JSON.parse(refused.text)).toMatchObject({
      code: 'storage-full',
      message: expect.stringContaining('What arrived is kept: make room, then go on.'),
    });
    const log = await agent.get(`/api/load-logs/${id}`).expect(200);
    expect(log.body).toMatchObject({ state: 'receiving', receivedBytes: 0, job: null });

    await send(other, 0, BYTES).expect(204);
    expect((await agent.get(`/api/load-logs/${other}`)).body.state).toBe('received');

    await rm(part);
    await writeFile(part, BYTES.subarray(0, 20));
    const head = await agent.head(`/api/uploads/${id}`).set(TUS).expect(200);
    expect(head.headers['upload-offset']).toBe('20');
    await send(id, 20, BYTES.subarray(20)).expect(204);
    expect((await agent.get(`/api/load-logs/${id}`)).body).toMatchObject({
      state: 'received',
      receivedBytes: BYTES.length,
    });
  });
});
