import { newId } from '../common/ids/new-id.js';
import { TestApp, type Agent } from '../testing/test-app.js';

let app: TestApp;
let administrator: Agent;

beforeAll(async () => {
  app = await TestApp.create();
  administrator = await app.signIn(await app.make.member('administrator', { name: 'Aa first' }));
});
afterAll(() => app?.close());

describe('a profile', () => {
  it('keeps name, units and look, one at a time', async () => {
    const agent = await app.signIn(await app.make.person({ name: 'Before' }));
    const change = (body: object) => agent.patch('/api/users/me').send(body);
    const { body } = await change({ version: 1, preferences: { forceUnit: 'lbf' } }).expect(200);
    expect(body.user).toMatchObject({
      name: 'Before',
      preferences: { forceUnit: 'lbf', lengthUnit: 'm' },
      version: 2,
    });
    await change({ version: 2, name: 'After', preferences: { theme: 'dark' } }).expect(200);
    const session = await agent.get('/api/auth/session').expect(200);
    expect(session.body.user).toMatchObject({
      name: 'After',
      preferences: { forceUnit: 'lbf', theme: 'dark', decimalComma: false },
      version: 3,
    });
    const conflict = await change({ version: 2, name: 'Late' }).expect(409);
    expect(conflict.body.current.user).toMatchObject({ name: 'After', version: 3 });
  });

  it('takes no role, no address and nothing else it does not know', async () => {
    const agent = await app.signIn(await app.make.person());
    for (const extra of [{ role: 'administrator' }, { email: 'x@example.test' }, { active: true }]) {
      await agent
        .patch('/api/users/me')
        .send({ version: 1, ...extra })
        .expect(400);
    }
  });
});

describe('the administrator', () => {
  it('sees people with their firms, page by page, and no password', async () => {
    const rigger = await app.make.member('rigger', { name: 'Zz last' });
    const seen: { id: string; memberships: unknown[] }[] = [];
    let cursor: string | null = null;
    do {
      const reply: { text: string; body: { items: typeof seen; nextCursor: string | null } } =
        await administrator
          .get(`/api/users?limit=2${cursor === null ? '' : `&cursor=${cursor}`}`)
          .expect(200);
      expect(reply.text).not.toContain('argon2');
      seen.push(...reply.body.items);
      cursor = reply.body.nextCursor;
    } while (cursor !== null);
    expect(new Set(seen.map(({ id }) => id)).size).toBe(seen.length);
    expect(seen.at(-1)).toMatchObject({
      id: rigger.id,
      memberships: [{ role: 'rigger', firmId: rigger.firmId, firmName: expect.any(String) }],
    });
  });

  it('sees firms with the number of their people', async () => {
    const firm = await app.make.firm({ name: 'Counted' });
    await app.make.member('rigger', { firmId: firm.id });
    const both = await app.make.member('rigger', { firmId: firm.id });
    await app.make.insert('membership', {
      id: newId(),
      user_id: both.id,
      firm_id: firm.id,
      role: 'surveyor',
      created_at: app.clock.now(),
    });
    const { body } = await administrator.get('/api/firms?limit=200').expect(200);
    expect(body.items).toContainEqual(expect.objectContaining({ id: firm.id, name: 'Counted', members: 2 }));
  });

  it('sees jobs, newest first, and no vessel', async () => {
    const vessel = await app.make.vessel();
    const ids = [newId(), newId(), newId()];
    for (const id of ids) {
      await app.make.insert('job', {
        id,
        kind: 'count-load-log',
        subject_id: newId(),
        vessel_id: vessel.id,
        input_version: 1,
        state: 'queued',
        created_at: app.clock.now(),
      });
    }
    const first = await administrator.get('/api/jobs?limit=2').expect(200);
    expect(first.body.items.map(({ id }: { id: string }) => id)).toEqual([ids[2], ids[1]]);
    expect(first.text).not.toContain(vessel.id);
    const second = await administrator.get(`/api/jobs?limit=2&cursor=${first.body.nextCursor}`).expect(200);
    expect(second.body).toMatchObject({ items: [{ id: ids[0] }], nextCursor: null });
    await administrator.get('/api/vessels').expect(403);
  });
});

describe('the audit trail', () => {
  it("shows a firm's people their vessels' events and their own deeds, and nothing of others", async () => {
    const [mine, theirs] = [await app.make.member('rigger'), await app.make.member('rigger')];
    const [tab, otherTab] = [await app.signIn(mine), await app.signIn(theirs)];
    const register = (agent: Agent, name: string) =>
      agent.post('/api/vessels').send({ name, rigType: 'cutter', zone: 'Europe/Oslo' }).expect(201);
    const vessel = (await register(tab, 'Mine')).body;
    const foreign = (await register(otherTab, 'Theirs')).body;
    await otherTab.patch('/api/users/me').send({ version: 1, name: 'Somebody' }).expect(200);
    await tab.patch('/api/users/me').send({ version: 1, name: 'Me' }).expect(200);

    const { body } = await tab.get('/api/audit-events').expect(200);
    expect(body.items.map(({ action, userName }: Record<string, string>) => [action, userName])).toEqual([
      ['user.profile-updated', 'Me'],
      ['vessel.registered', 'Me'],
    ]);
    const ofVessel = await tab.get(`/api/audit-events?vesselId=${vessel.id}`).expect(200);
    expect(ofVessel.body.items).toHaveLength(1);
    await tab.get(`/api/audit-events?vesselId=${foreign.id}`).expect(404);

    const service = (await administrator.get('/api/audit-events').expect(200)).body.items;
    const actions = new Set(service.map(({ action }: { action: string }) => action));
    expect(actions).toEqual(new Set(['user.profile-updated']));
  });
});
