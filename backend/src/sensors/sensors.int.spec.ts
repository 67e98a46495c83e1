import type { TestVessel } from '../testing/factories.js';
import { TestApp, type Agent } from '../testing/test-app.js';

let app: TestApp;
let agent: Agent;
let vessel: TestVessel;
let port: string;
let starboard: string;

beforeAll(async () => {
  app = await TestApp.create();
  const rigger = await app.make.member('rigger');
  agent = await app.signIn(rigger);
  vessel = await app.make.vessel({ firmId: rigger.firmId });
  port = (await app.make.position(vessel, { label: 'Cap shroud, port' })).id;
  starboard = (await app.make.position(vessel, { label: 'Cap shroud, starboard', side: 'starboard' })).id;
});
afterAll(() => app?.close());

const add = (body: object) => agent.post(`/api/vessels/${vessel.id}/sensors`).send(body);

describe('sensors', () => {
  it('measure a place, and give its twin a basis', async () => {
    const bases = async () =>
      (await agent.get(`/api/vessels/${vessel.id}/load-bases`).expect(200)).body.items.map(
        ({ basis }: { basis: string }) => basis,
      );
    expect(await bases()).toEqual(['none', 'none']);
    const { body } = await add({ name: 'Pin A', kind: 'pin', positionId: port }).expect(201);
    expect(body).toMatchObject({ positionLabel: 'Cap shroud, port', version: 1, events: [] });
    expect(body.wants.join(' ')).toContain('zero check');
    expect(await bases()).toEqual(['measured', 'mirrored']);
    const gone = await agent
      .patch(`/api/sensors/${body.id}`)
      .send({ version: 1, removedOn: '2027-06-01' })
      .expect(200);
    expect(gone.body.wants).toEqual([]);
    expect(await bases()).toEqual(['none', 'none']);
    await agent.patch(`/api/sensors/${body.id}`).send({ version: 1, name: 'X' }).expect(409);
  });

  it('take the scale of their kind and no other', async () => {
    const { body } = await add({
      name: 'Ram',
      kind: 'ram-pressure',
      positionId: port,
      scale: { by: 'ram-area', areaMm2: 1200 },
      inLine: [starboard],
    }).expect(201);
    expect(body.scale).toEqual({ by: 'ram-area', areaMm2: 1200 });
    const wrong = await add({ name: 'Pin B', kind: 'pin', scale: { by: 'ram-area', areaMm2: 1 } }).expect(
      400,
    );
    expect(wrong.body.fieldErrors).toHaveProperty('scale');
    const flat = { by: 'two-points', lowRaw: 1, lowKn: 0, highRaw: 1, highKn: 9 };
    await add({ name: 'Raw', kind: 'raw', scale: flat }).expect(400);
    await add({ name: 'Ram', kind: 'link' }).expect(400);
    const foreign = await app.make.position(await app.make.vessel());
    await add({ name: 'Link', kind: 'link', positionId: foreign.id }).expect(400);
  });

  it('keep what was done to them, newest first, and never change it', async () => {
    const { body: sensor } = await add({ name: 'Link F', kind: 'link' }).expect(201);
    const record = (event: object) => agent.post(`/api/sensors/${sensor.id}/events`).send(event);
    await record({ kind: 'calibration', doneOn: '2026-01-10', note: 'Papers 12' }).expect(201);
    const { body } = await record({
      kind: 'zero-check',
      doneOn: '2027-06-01',
      readingKn: 0.3,
      rigState: 'slack',
    }).expect(201);
    expect(body.events.map(({ kind }: { kind: string }) => kind)).toEqual(['zero-check', 'calibration']);
    expect(body.events[0].recordedByName).not.toBe('');
    await record({ kind: 'zero-check', doneOn: '2027-06-01' }).expect(400);
    await record({ kind: 'battery', doneOn: '2027-06-01' }).expect(400);
    await record({ kind: 'calibration', doneOn: '2027-12-01' }).expect(400);
    const { rows } = await app.database.admin.query(
      `select has_table_privilege('stayledger_app', 'sensor_event', 'update') as may`,
    );
    expect(rows[0].may).toBe(false);
  });
});
