import { TEST_PASSWORD } from '../../testing/factories.js';
import { TestApp } from '../../testing/test-app.js';

let written: string;
let app: TestApp;

beforeAll(async () => {
  written = '';
  for (const stream of [process.stdout, process.stderr]) {
    jest.spyOn(stream, 'write').mockImplementation((chunk: string | Uint8Array) => {
      written += String(chunk);
      return true;
    });
  }
  app = await TestApp.create({ env: { LOG_LEVEL: 'debug', NODE_ENV: 'production' } });
});
afterAll(async () => {
  await app?.close();
  jest.restoreAllMocks();
});

describe('the log', () => {
  it('has a line of JSON with the request id for each request, and no secret in any', async () => {
    const person = await app.make.person();
    const guess = 'a guess that must not be written down';
    const agent = app.agent();
    await agent.post('/api/auth/sign-in').send({ email: person.email, password: guess }).expect(401);
    const signIn = await agent
      .post('/api/auth/sign-in')
      .send({ email: person.email, password: TEST_PASSWORD });
    expect(signIn.status).toBe(200);
    await agent.get('/api/auth/session?token=in-the-query').expect(200);

    const line = written
      .split('\n')
      .filter((text) => text.startsWith('{'))
      .map((text) => JSON.parse(text) as { requestId?: string; message?: { path?: string; status?: number } })
      .find(({ requestId }) => requestId === signIn.headers['x-request-id']);
    expect(line?.message).toMatchObject({ path: '/api/auth/sign-in', status: 200 });

    const cookie = signIn.headers['set-cookie'][0].split(';')[0].split('=')[1];
    const { rows } = await app.database.admin.query('select password_hash from app_user where id = $1', [
      person.id,
    ]);
    const appPassword = new URL(app.database.appUrl).password;
    for (const secret of [
      guess,
      TEST_PASSWORD,
      cookie,
      rows[0].password_hash,
      'in-the-query',
      app.env.SESSION_SECRET,
      appPassword,
    ]) {
      expect(written).not.toContain(secret);
    }
  });
});
