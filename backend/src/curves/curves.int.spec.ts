import { readFileSync } from 'node:fs';
import { constructionsFileSchema } from '@stayledger/shared/contracts/constructions';
import { curvesFileSchema } from '@stayledger/shared/contracts/curves';
import { REFERENCE_FILES } from '../database/seed/reference-data.js';
import { TestApp, type Agent } from '../testing/test-app.js';

const { curves } = curvesFileSchema.parse(JSON.parse(readFileSync(REFERENCE_FILES.curve, 'utf8')));
const { constructions } = constructionsFileSchema.parse(
  JSON.parse(readFileSync(REFERENCE_FILES.construction, 'utf8')),
);

let app: TestApp;
let agent: Agent;

beforeAll(async () => {
  app = await TestApp.create();
  agent = await app.signIn(await app.make.member('insurer'));
});
afterAll(() => app?.close());

describe('reference data over HTTP', () => {
  it('are what the files say, each with its source', async () => {
    const list = (await agent.get('/api/curves').expect(200)).body.items;
    expect(new Set(list.map(({ id }: { id: string }) => id))).toEqual(new Set(curves.map(({ id }) => id)));
    expect(list.every(({ source }: { source: string }) => source.length > 0)).toBe(true);
    const [first] = curves;
    expect((await agent.get(`/api/curves/${first.id}`).expect(200)).body).toEqual({ ...first, firm: null });
    const wires = (await agent.get('/api/constructions').expect(200)).body.items;
    expect(wires).toHaveLength(constructions.length);
    expect(wires).toContainEqual({ ...constructions[0], firm: null });
  });

  it('show the newest version and keep the one an account was computed with', async () => {
    const [curve] = curves;
    await app.make.reference('curve', curve.id, { ...curve, version: 2, name: 'Corrected' }, 2);
    const path = `/api/curves/${curve.id}`;
    expect((await agent.get(path).expect(200)).body.name).toBe('Corrected');
    expect((await agent.get(`${path}?version=1`).expect(200)).body.name).toBe(curve.name);
    await agent.get(`${path}?version=3`).expect(404);
    const list = (await agent.get('/api/curves').expect(200)).body.items;
    expect(list.filter(({ id }: { id: string }) => id === curve.id)).toHaveLength(1);
  });

  it("keep a firm's own additions to that firm", async () => {
    const theirs = await app.make.member('rigger');
    await app.make.insert('curve', {
      id: 'their-own',
      version: 1,
      firm_id: theirs.firmId,
      name: 'Their own',
      data: { ...curves[0], id: 'their-own' },
      data_hash: 'x',
      created_at: app.clock.now(),
    });
    await agent.get('/api/curves/their-own').expect(404);
    await (await app.signIn(theirs)).get('/api/curves/their-own').expect(200);
  });
});

/** A log-log line through 80 MPa at two million cycles with slope 5: log10 a = log10(2e6) + 5 log10 80, by hand 15.8165. */
const ADD_CURVE = {
  name: 'Bench series, 10 mm swaged eyes',
  appliesTo: '1x19 strand with swaged eyes',
  measure: 'stress-metallic',
  level: 'mean-minus-k-sd',
  k: 2,
  sdLog10N: 0.2,
  environment: 'air',
  segments: [{ above: 0, m: 5, log10a: 15.8165 }],
  validity: { minRange: 60, maxRange: 240 },
  source: 'Own bench report 12, invented for this test',
  provenance: 'published',
  provenanceNote: 'Eleven pieces, read from the report.',
  analogyNote: 'The same wire and ends.',
};
const ADD_WIRE = {
  name: 'Strand by a certificate',
  kind: '1x19',
  materialId: 'stainless-316-wire',
  youngGpa: 130,
  replacementRuleId: 'stainless-wire',
  sizes: [
    { diameterMm: 12, metallicAreaMm2: 86, breakingLoadKn: 102, massKgPerM: 0.7 },
    { diameterMm: 10, metallicAreaMm2: 60, breakingLoadKn: 71, massKgPerM: 0.49 },
  ],
  source: 'Certificate 7, invented for this test',
  provenance: 'published',
  provenanceNote: 'Read from the certificate.',
};

describe("a firm's own reference data", () => {
  it('are added, corrected as a new version, and seen by the firm alone', async () => {
    const rigger = await app.make.member('rigger');
    const mine = await app.signIn(rigger);
    const added = (await mine.post('/api/curves').send(ADD_CURVE).expect(201)).body;
    expect(added).toMatchObject({ version: 1, firm: { id: rigger.firmId }, selectable: true, k: 2 });
    const path = `/api/curves/${added.id}`;
    await agent.get(path).expect(404);
    expect((await agent.get('/api/curves')).body.items).not.toContainEqual(
      expect.objectContaining({ id: added.id }),
    );
    const corrected = { ...ADD_CURVE, name: 'Bench series, recounted', version: 1 };
    await mine.post(`${path}/versions`).send(corrected).expect(201);
    expect((await mine.get(path).expect(200)).body).toMatchObject({ version: 2, name: corrected.name });
    expect((await mine.get(`${path}?version=1`).expect(200)).body.name).toBe(ADD_CURVE.name);
    const late = await mine.post(`${path}/versions`).send(corrected).expect(409);
    expect(late.body.current).toMatchObject({ version: 2 });
    const stranger = await app.signIn(await app.make.member('surveyor'));
    await stranger
      .post(`${path}/versions`)
      .send({ ...corrected, version: 2 })
      .expect(404);
  });

  it('work out what follows from a table: sizes in order, stiffness, kind of wire', async () => {
    const mine = await app.signIn(await app.make.member('rigger'));
    const wire = (await mine.post('/api/constructions').send(ADD_WIRE).expect(201)).body;
    expect(wire).toMatchObject({ kindOfWire: 'strand', version: 1 });
    expect(wire.sizes.map((size: { designation: string }) => size.designation)).toEqual(['10 mm', '12 mm']);
    // 130 GPa on 60 mm2: 7800 kN. Fill: 60 / 78.54 = 0.76394 and 86 / 113.10 = 0.76041, mean 0.76218, by hand.
    expect(wire.sizes[0].axialStiffnessKn).toBeCloseTo(7800, 6);
    expect(wire.fillFactor).toBeCloseTo(0.7622, 3);
    await mine
      .post(`/api/constructions/${wire.id}/versions`)
      .send({ ...ADD_WIRE, youngGpa: 128, version: 1 })
      .expect(201);
    await agent.post(`/api/constructions`).send(ADD_WIRE).expect(403);
  });

  it('serve a part, and are then read by whoever reaches its vessel and by nobody else', async () => {
    const vessel = await app.make.vessel();
    const rigger = await app.make.member('rigger', { firmId: vessel.firmId });
    const mine = await app.signIn(rigger);
    const position = await app.make.position(vessel);
    const wire = (await mine.post('/api/constructions').send(ADD_WIRE).expect(201)).body;
    const part = await mine
      .post(`/api/positions/${position.id}/parts`)
      .send({ constructionId: wire.id, diameterMm: 10 })
      .expect(201);
    expect(part.body).toMatchObject({ constructionName: ADD_WIRE.name, breakingLoadKn: 71 });
    const guest = await app.signIn(await app.make.userOn(vessel, 'owner'));
    expect((await guest.get(`/api/parts/${part.body.id}`).expect(200)).body.constructionName).toBe(
      ADD_WIRE.name,
    );
    const rig = (await guest.get(`/api/vessels/${vessel.id}/rig`).expect(200)).body.items;
    expect(rig[0].part.constructionName).toBe(ADD_WIRE.name);
    // Readable on the part is not the same as offered for another one.
    expect((await guest.get('/api/constructions')).body.items).not.toContainEqual(
      expect.objectContaining({ id: wire.id }),
    );
  });

  it.each([
    [
      'segments out of order',
      'segments',
      {
        segments: [
          { above: 0, m: 5, log10a: 15 },
          { above: 80, m: 3, log10a: 12 },
        ],
      },
    ],
    ['a range of tests upside down', 'validity.maxRange', { validity: { minRange: 200, maxRange: 100 } }],
    ['a level without its distance', 'k', { k: 0 }],
    ['no source', 'source', { source: ' ' }],
    ['another firm', 'firmId', { firmId: '0190d3a0-0001-7000-8000-00000000000f' }],
  ])('refuse %s', async (_what, field, change) => {
    const mine = await app.signIn(await app.make.member('rigger'));
    const refused = await mine
      .post('/api/curves')
      .send({ ...ADD_CURVE, ...change })
      .expect(400);
    expect(Object.keys(refused.body.fieldErrors)).toContain(field);
  });

  it('refuse an area larger than its circle, a size twice, an unknown rule or material', async () => {
    const mine = await app.signIn(await app.make.member('rigger'));
    const [size] = ADD_WIRE.sizes;
    const refusals: [string, object][] = [
      ['sizes.0.metallicAreaMm2', { sizes: [{ ...size, metallicAreaMm2: 130 }] }],
      ['sizes', { sizes: [size, size] }],
      ['replacementRuleId', { replacementRuleId: 'no-such-rule' }],
      ['materialId', { materialId: 'no-such-material' }],
    ];
    for (const [field, change] of refusals) {
      const refused = await mine
        .post('/api/constructions')
        .send({ ...ADD_WIRE, ...change })
        .expect(400);
      expect(Object.keys(refused.body.fieldErrors)).toContain(field);
    }
  });
});
