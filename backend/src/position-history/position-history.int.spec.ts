import type { PositionHistoryDto } from '@stayledger/shared/contracts/position-history';
import { TestApp } from '../testing/test-app.js';

let app: TestApp;

beforeAll(async () => {
  app = await TestApp.create();
});
afterAll(() => app?.close());

const WIRE = { constructionId: 'strand-1x19-316', diameterMm: 8 };

describe('the history of a position', () => {
  it('shows every part it has had, the one in place first, also to the owner', async () => {
    const rigger = await app.make.member('rigger');
    const vessel = await app.make.vessel({ firmId: rigger.firmId, buildYear: 2010 });
    const position = await app.make.position(vessel, { label: 'Backstay', kind: 'backstay' });
    const agent = await app.signIn(rigger);
    const fit = async (body: object) =>
      (await agent.post(`/api/positions/${position.id}/parts`).send(body).expect(201)).body;
    const remove = (part: { id: string; version: number }, removedOn: string, reason: string) =>
      agent
        .post(`/api/parts/${part.id}/remove`)
        .send({ version: part.version, removedOn, reason })
        .expect(200);

    const first = await fit({ ...WIRE, fittedOn: '2014-05-01', batch: 'B-1' });
    await remove(first, '2020-03-10', 're-rig');
    const second = await fit({ ...WIRE, diameterMm: 10, fittedOn: '2020-03-10' });
    await remove(second, '2026-04-02', 'broken wire');
    const third = await fit(WIRE);

    const owner = await app.signIn(await app.make.userOn(vessel, 'owner'));
    for (const visitor of [agent, owner]) {
      const { body } = await visitor.get(`/api/positions/${position.id}/history`).expect(200);
      const history = body as PositionHistoryDto;
      expect(history).toMatchObject({ label: 'Backstay', vesselId: vessel.id, vesselName: vessel.name });
      expect(history.parts).toEqual([
        expect.objectContaining({ id: third.id, fittedOn: null, removedOn: null, removedReason: null }),
        expect.objectContaining({
          id: second.id,
          diameterMm: 10,
          fittedOn: '2020-03-10',
          removedOn: '2026-04-02',
          removedReason: 'broken wire',
        }),
        expect.objectContaining({ id: first.id, batch: 'B-1', removedOn: '2020-03-10', entries: 0 }),
      ]);
      // Each account stays reachable after its part came off.
      for (const part of history.parts) await visitor.get(`/api/parts/${part.id}/life`).expect(200);
    }
  });

  it('is empty for a place that never had a part, and closed to strangers', async () => {
    const vessel = await app.make.vessel();
    const position = await app.make.position(vessel);
    const agent = await app.signIn(await app.make.userOn(vessel, 'surveyor'));
    const { body } = await agent.get(`/api/positions/${position.id}/history`).expect(200);
    expect(body.parts).toEqual([]);
    const stranger = await app.signIn(await app.make.member('rigger'));
    await stranger.get(`/api/positions/${position.id}/history`).expect(404);
  });
});
