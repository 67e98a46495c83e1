import { readdir } from 'node:fs/promises';
import { join } from 'node:path';
import type { TestUser, TestVessel } from '../testing/factories.js';
import { TestApp, type Agent } from '../testing/test-app.js';
import { LogReceiver } from './log-receiver.js';

jest.setTimeout(60_000);

const BYTES = Buffer.from('time,load\n2026-06-01T00:00:00Z,1\n2026-06-01T00:00:01Z,2\n');
const TUS = { 'Tus-Resumable': '1.0.0' };

describe('cancelling an upload', () => {
  let app: TestApp;
  let vessel: TestVessel;
  let rigger: TestUser;
  let agent: Agent;
  let positionId: string;

  beforeAll(async () => {
    app = await TestApp.create();
    vessel = await app.make.vessel();
    rigger = await app.make.userOn(vessel, 'rigger', { firmId: vessel.firmId });
    agent = await app.signIn(rigger);
    positionId = (await app.make.position(vessel)).id;
  });
  afterAll(() => app?.close());

  /** A log of which the given bytes have arrived. */
  async function receiving(bytes: Buffer): Promise<string> {
    const announced = await agent.post(`/api/vessels/${vessel.id}/load-logs`).send({
      fileName: 'log.csv',
      sizeBytes: BYTES.length,
      mapping: {
        time: { column: 'time', format: 'iso' },
        channels: [{ column: 'load', unit: 'kN', positionId }],
      },
    });
    const id: string = announced.body.id;
    await agent.post('/api/uploads').set({
      ...TUS,
      'Upload-Length': String(BYTES.length),
      'Upload-Metadata': `loadLogId ${Buffer.from(id).toString('base64')}`,
    });
    const sent = await agent
      .patch(`/api/uploads/${id}`)
      .set({ ...TUS, 'Upload-Offset': '0', 'Content-Type': 'application/offset+octet-stream' })
      .send(bytes);
    expect(sent.status).toBe(204);
    return id;
  }

  it('throws away what arrived and says so on the log', async () => {
    const id = await receiving(BYTES.subarray(0, 20));
    expect((await agent.delete(`/api/uploads/${id}`).set(TUS)).status).toBe(204);
    const log = (await agent.get(`/api/load-logs/${id}`)).body;
    expect(log).toMatchObject({ state: 'failed', failure: { code: 'upload-cancelled' } });
    expect((await agent.head(`/api/uploads/${id}`).set(TUS)).status).toBe(404);
  });

  it('is finished by the sweep when the process ended before the bytes were gone', async () => {
    const id = await receiving(BYTES.subarray(0, 20));
    const other = await receiving(BYTES.subarray(0, 20));
    await app.database.admin.query(`update load_log set state = 'failed' where id = $1`, [id]);
    // Files are dated by the machine's clock, and swept by the clock of the service.
    app.clock.setTo(new Date(Date.now() + 1000).toISOString());
    await app.nest.get(LogReceiver).sweep();
    const left = await readdir(join(app.env.STAYLEDGER_DATA, 'files', vessel.id));
    expect(left).not.toContain(`${id}.part`);
    expect(left).toContain(`${other}.part`);
  });

  it('keeps a file that has arrived in full', async () => {
    const id = await receiving(BYTES);
    const refused = await agent.delete(`/api/uploads/${id}`).set(TUS);
    expect(refused.status).toBe(409);
    expect(JSON.parse(refused.text)).toMatchObject({ code: 'state-conflict' });
    const file = await agent.get(`/api/load-logs/${id}/file`).responseType('blob');
    expect(file.body).toEqual(BYTES);
  });

  it('does not tell a foreign upload from an absent one', async () => {
    const id = await receiving(BYTES.subarray(0, 20));
    const other = await app.make.vessel();
    const stranger = await app.signIn(await app.make.userOn(other, 'rigger', { firmId: other.firmId }));
    expect((await stranger.delete(`/api/uploads/${id}`).set(TUS)).status).toBe(404);
    expect((await agent.get(`/api/load-logs/${id}`)).body.state).toBe('receiving');
  });
});
