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
    expect((await agent.get(`/api/curves/${first.id}`).expect(200)).body).toEqual(first);
    const wires = (await agent.get('/api/constructions').expect(200)).body.items;
    expect(wires).toHaveLength(constructions.length);
    expect(wires).toContainEqual(constructions[0]);
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
