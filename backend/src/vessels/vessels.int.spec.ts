import { TestApp, type Agent } from '../testing/test-app.js';
import type { TestUser } from '../testing/factories.js';

let app: TestApp;
let rigger: TestUser & { firmId: string };
let agent: Agent;

beforeAll(async () => {
  app = await TestApp.create();
  rigger = await app.make.member('rigger');
  agent = await app.signIn(rigger);
});
afterAll(() => app?.close());

const newVessel = { name: 'Skarv', rigType: 'cutter', zone: 'Europe/Oslo', buildYear: 1998 };

describe('registering a vessel', () => {
  it('gives her to the firm of whoever registers her', async () => {
    const { body } = await agent.post('/api/vessels').send(newVessel).expect(201);
    expect(body).toMatchObject({
      ...newVessel,
      firmId: rigger.firmId,
      useKind: 'private',
      notes: '',
      version: 1,
    });
    expect(body.permissions).toContain('rig:update');
    await agent.get(`/api/vessels/${body.id}`).expect(200, body);
    const { rows } = await app.database.admin.query(
      'select action, user_id from audit_event where vessel_id = $1',
      [body.id],
    );
    expect(rows).toEqual([{ action: 'vessel.registered', user_id: rigger.id }]);
  });

  it('names every field that is wrong, and unknown ones', async () => {
    const { body } = await agent
      .post('/api/vessels')
      .send({ name: ' ', rigType: 'barge', zone: 'Nowhere/Land', colour: 'blue' })
      .expect(400);
    expect(body.code).toBe('invalid-request');
    expect(Object.keys(body.fieldErrors).sort()).toEqual(['colour', 'name', 'rigType', 'zone']);
  });

  it('asks which firm when there are several, and takes no other', async () => {
    const second = await app.make.firm();
    const both = await app.make.member('surveyor', { firmId: second.id });
    await app.make.insert('membership', {
      id: second.id,
      user_id: both.id,
      firm_id: rigger.firmId,
      role: 'rigger',
      created_at: app.clock.now(),
    });
    const tab = await app.signIn(both);
    expect((await tab.post('/api/vessels').send(newVessel).expect(400)).body.fieldErrors).toHaveProperty(
      'firmId',
    );
    await tab
      .post('/api/vessels')
      .send({ ...newVessel, firmId: second.id })
      .expect(201);
    const foreign = await app.make.firm();
    await tab
      .post('/api/vessels')
      .send({ ...newVessel, firmId: foreign.id })
      .expect(400);
  });

  it('carries a request out once per key, also when both arrive at the same time', async () => {
    const key = '0190a0a0-0000-7000-8000-000000000001';
    const send = () =>
      agent
        .post('/api/vessels')
        .set('Idempotency-Key', key)
        .send({ ...newVessel, name: 'Once' });
    const [first, second] = await Promise.all([send(), send()]);
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(second.body).toEqual(first.body);
    const { rows } = await app.database.admin.query(
      `select count(*)::int as n from vessel where name = 'Once'`,
    );
    expect(rows[0].n).toBe(1);
    const other = await agent
      .post('/api/vessels')
      .set('Idempotency-Key', key)
      .send({ ...newVessel, name: 'Twice' })
      .expect(409);
    expect(other.body.code).toBe('idempotency-mismatch');
  });

  it('forgets a key after a day and does not keep one for a failure', async () => {
    const key = '0190a0a0-0000-7000-8000-000000000002';
    const send = (name: string) =>
      agent
        .post('/api/vessels')
        .set('Idempotency-Key', key)
        .send({ ...newVessel, name });
    await send('').expect(400);
    await send('Kept').expect(201);
    app.clock.advance({ hours: 25 });
    const later = await app.signIn(rigger);
    await later
      .post('/api/vessels')
      .set('Idempotency-Key', key)
      .send({ ...newVessel, name: 'Later' })
      .expect(201);
    agent = later;
  });
});

describe('changing a vessel', () => {
  it('answers 409 with the stored state when somebody saved in between', async () => {
    const { body: vessel } = await agent.post('/api/vessels').send(newVessel).expect(201);
    const path = `/api/vessels/${vessel.id}`;
    const { body: saved } = await agent.patch(path).send({ version: 1, homePort: 'Kvitnes' }).expect(200);
    expect(saved).toMatchObject({ homePort: 'Kvitnes', version: 2, name: vessel.name });
    const { body: conflict } = await agent
      .patch(path)
      .send({ version: 1, homePort: 'Elsewhere' })
      .expect(409);
    expect(conflict).toMatchObject({ code: 'version-conflict', current: saved });
  });

  it('lets one of two at the same time through', async () => {
    const { body: vessel } = await agent.post('/api/vessels').send(newVessel).expect(201);
    const replies = await Promise.all(
      ['A', 'B'].map((homePort) => agent.patch(`/api/vessels/${vessel.id}`).send({ version: 1, homePort })),
    );
    expect(replies.map(({ status }) => status).sort()).toEqual([200, 409]);
  });
});

describe('the fleet', () => {
  it('shows an owner their own vessel and an outsider nothing', async () => {
    const vessel = await app.make.vessel({ firmId: rigger.firmId });
    const owner = await app.signIn(await app.make.userOn(vessel, 'owner'));
    const outsider = await app.signIn(await app.make.member('surveyor'));
    expect((await owner.get('/api/vessels').expect(200)).body.items).toMatchObject([{ id: vessel.id }]);
    expect((await outsider.get('/api/vessels').expect(200)).body).toEqual({ items: [], nextCursor: null });
    expect((await outsider.get(`/api/vessels/${vessel.id}`).expect(404)).body.code).toBe('not-found');
  });
});
