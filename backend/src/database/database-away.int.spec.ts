import { Client } from 'pg';
import { TestApp, type Agent } from '../testing/test-app.js';

let app: TestApp;
let agent: Agent;

beforeAll(async () => {
  app = await TestApp.create();
  agent = await app.signIn(await app.make.member('rigger'));
});
afterAll(() => app?.close());

/** Locks the application out of its database and ends its connections, as a restart of PostgreSQL does. */
async function whileAway(work: () => Promise<void>): Promise<void> {
  const url = new URL(process.env.TEST_DATABASE_ADMIN_URL ?? '');
  const admin = new Client({ connectionString: url.href });
  await admin.connect();
  const { name } = app.database;
  try {
    await admin.query(`alter database ${name} connection limit 0`);
    await admin.query(
      `select pg_terminate_backend(pid) from pg_stat_activity
        where datname = $1 and usename = 'stayledger_test_app'`,
      [name],
    );
    await work();
  } finally {
    await admin.query(`alter database ${name} connection limit -1`);
    await admin.end();
  }
}

describe('a database that goes away', () => {
  it('is said in words with a time to come back, and the service recovers by itself', async () => {
    await agent.get('/api/vessels').expect(200);
    await whileAway(async () => {
      for (const request of [
        agent.get('/api/vessels'),
        app.agent().get('/api/health'),
        app.agent().post('/api/auth/sign-in').send({ email: 'a@b.example', password: 'c' }),
      ]) {
        const reply = await request;
        expect([reply.status, reply.body.code]).toEqual([503, 'unavailable']);
        expect(Number(reply.headers['retry-after'])).toBeGreaterThan(0);
        expect(reply.text).not.toContain(app.database.name);
      }
    });
    await agent.get('/api/vessels').expect(200);
    await app.agent().get('/api/health').expect(200);
  }, 60_000);
});
