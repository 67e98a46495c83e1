import type { YardTermsDto } from '@stayledger/shared/contracts/yard-terms';
import { newId } from '../common/ids/new-id.js';
import type { TestVessel } from '../testing/factories.js';
import { type Agent, TestApp } from '../testing/test-app.js';

jest.setTimeout(60_000);

let app: TestApp;
let vessel: TestVessel;
let rigger: Agent;
let owner: Agent;

beforeAll(async () => {
  app = await TestApp.create();
  vessel = await app.make.vessel();
  rigger = await app.signIn(await app.make.userOn(vessel, 'rigger', { firmId: vessel.firmId }));
  owner = await app.signIn(await app.make.userOn(vessel, 'owner'));
});
afterAll(() => app?.close());

describe('the terms of a firm', () => {
  it('start from an estimate, are stated under a version, and are the firm’s alone', async () => {
    const start = (await rigger.get('/api/yard-terms').expect(200)).body as YardTermsDto;
    expect(start).toMatchObject({ firmId: vessel.firmId, currency: 'EUR', version: null });
    const terms = { ...start.terms, orderMarginDays: 21 };
    const stated = await rigger.put('/api/yard-terms').send({ terms }).expect(200);
    expect(stated.body).toMatchObject({ version: 1, terms: { orderMarginDays: 21 } });
    const refused = await rigger.put('/api/yard-terms').send({ terms }).expect(409);
    expect(refused.body).toMatchObject({ code: 'version-conflict', current: { version: 1 } });
    const stranger = await app.signIn(await app.make.member('rigger'));
    expect((await stranger.get('/api/yard-terms').expect(200)).body).toMatchObject({
      version: null,
      terms: { orderMarginDays: 14 },
    });
    await owner.get('/api/yard-terms').expect(403);
  });

  it('refuse a visit that costs nothing, a closure that ends before it begins, and a day that is none', async () => {
    const { body } = await rigger.get('/api/yard-terms').expect(200);
    const { terms, version } = body as YardTermsDto;
    const send = (changed: Partial<YardTermsDto['terms']>) =>
      rigger
        .put('/api/yard-terms')
        .send({ version, terms: { ...terms, ...changed } })
        .expect(400);
    const free = await send({ visits: { ...terms.visits, aloft: { costMinor: 0, hours: 1 } } });
    expect(Object.keys(free.body.fieldErrors as object)).toEqual(['terms.visits.aloft.costMinor']);
    await send({ closures: [{ fromOn: '2027-02-02', untilOn: '2027-02-01', reason: '' }] });
    await send({ seasons: [{ ...terms.seasons[0], fromDay: '02-30' }] });
    await send({ seasons: [] });
  });
});

describe('reach of schedules', () => {
  it('is asked for at every route', async () => {
    const stranger = await app.signIn(await app.make.member('rigger'));
    const insurer = await app.signIn(await app.make.userOn(vessel, 'insurer'));
    const routes = (id: string): ['get' | 'put' | 'post', string, object?][] => [
      ['get', `/api/vessels/${id}/rerig-schedule`],
      ['get', `/api/vessels/${id}/rerig-schedule/calendar`],
      ['post', `/api/vessels/${id}/rerig-schedule/plans`, {}],
      ['put', `/api/vessels/${id}/rerig-schedule/settings`, { horizonYears: 5, absences: [] }],
      ['post', `/api/vessels/${id}/rerig-schedule/undo`, { version: 1 }],
      ['post', `/api/vessels/${id}/rerig-schedule/state`, { version: 1, state: 'proposed' }],
    ];
    const absent = routes(newId());
    const without = ({ body }: { body: object }) => ({ ...body, requestId: '' });
    for (const [i, [method, url, body]] of routes(vessel.id).entries()) {
      await app.agent()[method](url).send(body).expect(401);
      const foreign = await stranger[method](url).send(body).expect(404);
      expect(without(foreign)).toEqual(without(await stranger[method](absent[i][1]).send(body).expect(404)));
      await insurer[method](url).send(body).expect(403);
      if (method !== 'get') await owner[method](url).send(body).expect(403);
    }
    const answer = `/api/vessels/${vessel.id}/rerig-schedule/answer`;
    await rigger.post(answer).send({ version: 1, answer: 'accept' }).expect(403);
    await owner.post(answer).send({ version: 1, answer: 'accept' }).expect(409);
  });
});

describe('asking for a plan', () => {
  it('is done once when two people ask at the same moment', async () => {
    const other = await app.make.vessel();
    const people = await Promise.all(
      (['rigger', 'surveyor'] as const).map(async (role) => app.signIn(await app.make.userOn(other, role))),
    );
    const replies = await Promise.all(
      people.map((person) => person.post(`/api/vessels/${other.id}/rerig-schedule/plans`).send({})),
    );
    expect(replies.map(({ status }) => status).sort()).toEqual([202, 409]);
  });

  it('needs a plan to be changed first, and cannot go on from none', async () => {
    const other = await app.make.vessel();
    const agent = await app.signIn(await app.make.userOn(other, 'rigger'));
    const path = `/api/vessels/${other.id}/rerig-schedule`;
    await agent
      .post(`${path}/plans`)
      .send({ change: { change: 'lock', windowId: '2028-spring' } })
      .expect(409);
    await agent
      .post(`${path}/plans`)
      .send({ change: { change: 'move', fromWindowId: 'a', toWindowId: 'a' } })
      .expect(400);
    const { body } = await agent.post(`${path}/plans`).send({}).expect(202);
    await agent.post(`${path}/state`).send({ version: body.version, state: 'proposed' }).expect(409);
    await agent.post(`${path}/undo`).send({ version: body.version }).expect(409);
  });
});
