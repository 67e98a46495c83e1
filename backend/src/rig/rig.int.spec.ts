import { TestApp, type Agent } from '../testing/test-app.js';
import type { TestVessel } from '../testing/factories.js';

let app: TestApp;
let agent: Agent;
let firmId: string;
let vessel: TestVessel;

beforeAll(async () => {
  app = await TestApp.create();
  const rigger = await app.make.member('rigger');
  firmId = rigger.firmId;
  agent = await app.signIn(rigger);
});
afterAll(() => app?.close());
beforeEach(async () => {
  vessel = await app.make.vessel({ firmId });
});

const add = (body: object) => agent.post(`/api/vessels/${vessel.id}/positions`).send(body);

describe('places on the rig', () => {
  it('are named by kind, side and mast, with the short name beside it', async () => {
    const port = await add({ kind: 'cap-shroud', side: 'port' }).expect(201);
    expect(port.body).toMatchObject({
      label: 'Cap shroud, port',
      alias: 'V1',
      mast: 'main',
      part: null,
      version: 1,
    });
    const mizzen = await add({ kind: 'cap-shroud', side: 'port', mast: 'mizzen' }).expect(201);
    expect(mizzen.body.label).toBe('Cap shroud, port (mizzen mast)');
    const forestay = await add({ kind: 'forestay', side: 'centre' }).expect(201);
    expect(forestay.body).toMatchObject({ label: 'Forestay', alias: null });
  });

  it('stand in rig order, each with its part', async () => {
    await add({ kind: 'backstay', side: 'centre' }).expect(201);
    await add({ kind: 'lower', side: 'starboard' }).expect(201);
    const cap = await add({ kind: 'cap-shroud', side: 'port' }).expect(201);
    await add({ kind: 'forestay', side: 'centre' }).expect(201);
    await agent
      .post(`/api/positions/${cap.body.id}/parts`)
      .send({ constructionId: 'fibre-hmpe', diameterMm: 9, fittedOn: '2025-03-01' })
      .expect(201);
    const { body } = await agent.get(`/api/vessels/${vessel.id}/rig`).expect(200);
    expect(body.items.map(({ label }: { label: string }) => label)).toEqual([
      'Forestay',
      'Cap shroud, port',
      'Lower shroud, starboard',
      'Backstay',
    ]);
    expect(body.items[1].part).toMatchObject({
      kindOfWire: 'fibre',
      diameterMm: 9,
      fittedOn: '2025-03-01',
      standing: { assessment: 'calendar-only', governingRule: 'calendar' },
    });
    expect(body.items[0].part).toBeNull();
  });

  it('have names of their own on each vessel', async () => {
    await add({ kind: 'backstay', side: 'centre' }).expect(201);
    const twin = await add({ kind: 'backstay', side: 'centre' }).expect(400);
    expect(twin.body.fieldErrors).toHaveProperty('label');
    await add({ kind: 'backstay', side: 'centre', label: 'Backstay, second' }).expect(201);
    const racing = await Promise.all([1, 2].map(() => add({ kind: 'babystay', side: 'centre' })));
    expect(racing.map(({ status }) => status).sort()).toEqual([201, 400]);
    vessel = await app.make.vessel({ firmId });
    await add({ kind: 'backstay', side: 'centre' }).expect(201);
  });

  it('are of a kind the trade knows', async () => {
    const { body } = await add({ kind: 'clothes-line', side: 'port' }).expect(400);
    expect(body.fieldErrors).toHaveProperty('kind');
  });

  it('can be named differently, and a conflict shows the stored state', async () => {
    const { body } = await add({ kind: 'lower', side: 'port' }).expect(201);
    const path = `/api/positions/${body.id}`;
    const renamed = await agent.patch(path).send({ version: 1, label: 'Lower, port' }).expect(200);
    expect(renamed.body).toMatchObject({ label: 'Lower, port', kind: 'lower', version: 2 });
    const conflict = await agent.patch(path).send({ version: 1, label: 'Something else' }).expect(409);
    expect(conflict.body.current).toMatchObject({ label: 'Lower, port', version: 2 });
  });

  it('carry their importance to the part: where a loss drops the mast, the factor is larger', async () => {
    const { body: position } = await add({ kind: 'babystay', side: 'centre' }).expect(201);
    const { body: part } = await agent
      .post(`/api/positions/${position.id}/parts`)
      .send({ constructionId: 'strand-1x19-316', diameterMm: 8 })
      .expect(201);
    await agent.patch(`/api/positions/${position.id}`).send({ version: 1, kind: 'forestay' }).expect(200);
    const { body: after } = await agent.get(`/api/parts/${part.id}`).expect(200);
    const largest = (details: { designFatigueFactor: number }[]) =>
      Math.max(...details.map(({ designFatigueFactor }) => designFatigueFactor));
    expect(largest(after.details)).toBeGreaterThan(largest(part.details));
  });
});
