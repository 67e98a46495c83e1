import type { TestVessel } from '../testing/factories.js';
import { TestApp, type Agent } from '../testing/test-app.js';

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

const path = () => `/api/vessels/${vessel.id}/rig/geometry`;

describe('a rig from a template', () => {
  it('has the places of its type, and a second time adds nothing', async () => {
    const apply = () =>
      agent.post(`/api/vessels/${vessel.id}/rig/template`).send({ template: 'ketch' }).expect(201);
    const { body } = await apply();
    const labels = body.items.map(({ label }: { label: string }) => label);
    expect(labels).toEqual(
      expect.arrayContaining(['Forestay', 'Bobstay', 'Cap shroud, port', 'Cap shroud, port (mizzen mast)']),
    );
    expect((await apply()).body.items).toHaveLength(labels.length);
    const { body: drawn } = await agent.get(path()).expect(200);
    expect(drawn.source).toBe('entered');
    expect(drawn.geometry.masts.map(({ key }: { key: string }) => key)).toEqual(['main', 'mizzen']);
    expect(drawn.positions.every(({ lengthM }: { lengthM: number }) => lengthM > 0)).toBe(true);
  });

  it('keeps what was there', async () => {
    const { body: kept } = await agent
      .post(`/api/vessels/${vessel.id}/positions`)
      .send({ kind: 'backstay', side: 'centre', label: 'The old backstay' })
      .expect(201);
    const { body } = await agent
      .post(`/api/vessels/${vessel.id}/rig/template`)
      .send({ template: 'masthead-sloop', spreaders: 1 })
      .expect(201);
    const backstays = body.items.filter(({ kind }: { kind: string }) => kind === 'backstay');
    expect(backstays).toMatchObject([{ id: kept.id, label: 'The old backstay' }]);
  });
});

describe('a pair', () => {
  it('is entered once and fitted once', async () => {
    const pair = () => agent.post(`/api/vessels/${vessel.id}/position-pairs`);
    const { body } = await pair().send({ kind: 'lower' }).expect(201);
    expect(body.items.map(({ side }: { side: string }) => side)).toEqual(['port', 'starboard']);
    const fit = (id: string, alsoOtherSide: boolean) =>
      agent
        .post(`/api/positions/${id}/parts`)
        .send({ constructionId: 'strand-1x19-316', diameterMm: 8, alsoOtherSide });
    await fit(body.items[1].id, true).expect(201);
    const { body: rig } = await agent.get(`/api/vessels/${vessel.id}/rig`).expect(200);
    expect(rig.items.map(({ part }: { part: { diameterMm: number } }) => part.diameterMm)).toEqual([8, 8]);
    const { body: single } = await agent
      .post(`/api/vessels/${vessel.id}/positions`)
      .send({ kind: 'diamond', side: 'port' })
      .expect(201);
    expect((await fit(single.id, true).expect(400)).body.fieldErrors).toHaveProperty('alsoOtherSide');
    await pair().send({ kind: 'forestay' }).expect(400);
  });
});

describe('geometry', () => {
  it('is suggested until somebody enters it, and then kept by version', async () => {
    await agent.post(`/api/vessels/${vessel.id}/position-pairs`).send({ kind: 'cap-shroud' }).expect(201);
    const { body: suggested } = await agent.get(path()).expect(200);
    expect(suggested).toMatchObject({ source: 'suggested', version: null });
    const run = {
      lower: { aftM: 4, starboardM: -1, upM: 0 },
      via: [],
      upper: { aftM: 4, starboardM: 0, upM: 10 },
    };
    const { body: saved } = await agent
      .put(path())
      .send({
        version: null,
        geometry: { ...suggested.geometry, beamM: 3 },
        positions: [{ positionId: suggested.positions[0].positionId, geometry: run }],
      })
      .expect(200);
    // The root of 1 + 100.
    expect(saved.positions[0]).toMatchObject({ source: 'entered', lengthM: 10.05 });
    expect(saved).toMatchObject({ source: 'entered', version: 1, geometry: { beamM: 3 } });
    const stale = await agent.put(path()).send({ version: null, geometry: saved.geometry }).expect(409);
    expect(stale.body.current.version).toBe(1);
    const again = await agent.put(path()).send({ version: 1, geometry: saved.geometry }).expect(200);
    expect(again.body.version).toBe(2);
  });

  it('refuses hounds above the masthead, crossed spreaders, twin masts and places of another vessel', async () => {
    const { body } = await agent.get(path()).expect(200);
    const [mast] = body.geometry.masts;
    const put = (masts: object[], positions: object[] = []) =>
      agent.put(path()).send({ version: null, geometry: { ...body.geometry, masts }, positions });
    await put([{ ...mast, houndsHeightM: mast.heightM + 1 }]).expect(400);
    await put([{ ...mast, spreaders: [...mast.spreaders].reverse() }]).expect(400);
    await put([mast, mast]).expect(400);
    const foreign = await app.make.position(await app.make.vessel({ firmId }));
    await put([mast], [{ positionId: foreign.id, geometry: null }]).expect(400);
  });
});
