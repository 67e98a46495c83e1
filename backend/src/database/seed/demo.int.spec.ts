import { MikroORM } from '@mikro-orm/postgresql';
import { DEMO_PASSWORD } from '../../auth/demo.js';
import { TestApp } from '../../testing/test-app.js';
import { ormOptions } from '../mikro-orm.config.js';
import { DEMO_PEOPLE, DEMO_VESSELS } from './demo-scenario.js';
import { seedDemo } from './demo.js';

let app: TestApp;
let owner: MikroORM;

beforeAll(async () => {
  app = await TestApp.create({ env: { STAYLEDGER_DEMO: '1', HOST: '127.0.0.1' } });
  owner = await MikroORM.init(ormOptions(app.database.ownerUrl));
});
afterAll(async () => {
  await owner?.close(true);
  await app?.close();
});

const emailOf = (role: string) => DEMO_PEOPLE.find((person) => person.role === role)?.email ?? '';

describe('the demo', () => {
  it('is made once', async () => {
    expect(await seedDemo(owner.em.fork(), app.clock)).toEqual({ vessels: 5, users: 5 });
    expect(await seedDemo(owner.em.fork(), app.clock)).toBeNull();
  });

  it('offers its sign-ins, each of which opens', async () => {
    const { body } = await app.agent().get('/api/auth/demo-sign-ins').expect(200);
    expect(body.items).toHaveLength(5);
    for (const { email, password } of body.items) await app.signIn({ email }, password);
  });

  it('opens on a fleet with a story', async () => {
    const agent = await app.signIn({ email: emailOf('surveyor') }, DEMO_PASSWORD);
    const { body } = await agent.get('/api/vessels').expect(200);
    expect(body.items).toHaveLength(5);
    const counts = body.items.map((row: { counts: Record<string, number> }) => row.counts);
    const total = (key: string) =>
      counts.reduce((sum: number, row: Record<string, number>) => sum + row[key], 0);
    expect(total('overdue')).toBeGreaterThanOrEqual(1);
    expect(total('due')).toBeGreaterThanOrEqual(1);
    expect(total('notAssessed')).toBeGreaterThanOrEqual(2);
    expect(body.items[0].governing.due).toBe('overdue');
  });

  it('has a yard with prices of its own, and a first plan that waits to be made', async () => {
    const rigger = await app.signIn({ email: emailOf('rigger') }, DEMO_PASSWORD);
    const { body: terms } = await rigger.get('/api/yard-terms').expect(200);
    expect(terms).toMatchObject({ currency: 'NOK', version: 1, terms: { closures: [{}] } });
    const { body } = await rigger.get(`/api/vessels/${DEMO_VESSELS[0].id}/rerig-schedule`).expect(200);
    expect(body).toMatchObject({ plan: null, planning: { kind: 'plan-rerig', state: 'queued' } });
  });

  it('shows the owner one vessel and the insurer no rig', async () => {
    const ownerTab = await app.signIn({ email: emailOf('owner') }, DEMO_PASSWORD);
    const { body } = await ownerTab.get('/api/vessels').expect(200);
    expect(body.items.map((row: { name: string }) => row.name)).toEqual([DEMO_VESSELS[0].name]);
    const insurer = await app.signIn({ email: emailOf('insurer') }, DEMO_PASSWORD);
    await insurer.get('/api/vessels').expect(403);
  });
});

it('keeps the demo closed where strangers could try its password', async () => {
  const open = await TestApp.create({ env: { STAYLEDGER_DEMO: '1', HOST: '0.0.0.0' } });
  const orm = await MikroORM.init(ormOptions(open.database.ownerUrl));
  try {
    await seedDemo(orm.em.fork(), open.clock);
    expect((await open.agent().get('/api/auth/demo-sign-ins').expect(200)).body).toEqual({ items: [] });
    const reply = await open
      .agent()
      .post('/api/auth/sign-in')
      .send({ email: emailOf('rigger'), password: DEMO_PASSWORD })
      .expect(401);
    expect(reply.body.code).toBe('wrong-credentials');
  } finally {
    await orm.close(true);
    await open.close();
  }
});
