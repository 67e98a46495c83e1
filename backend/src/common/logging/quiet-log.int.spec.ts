import { TEST_PASSWORD } from '../../testing/factories.js';
import { TestApp, type Agent } from '../../testing/test-app.js';
import { newId } from '../ids/new-id.js';

const NEW_PASSWORD = 'hunting the quiet albatross';
const GUESS = 'a guess nobody should read';
const TUS = { 'Tus-Resumable': '1.0.0' };

/** Everything the process writes while `work` runs, whoever writes it. */
async function writtenDuring(work: () => Promise<void>): Promise<string> {
  const lines: string[] = [];
  const keep = (chunk: string | Uint8Array): boolean => {
    lines.push(typeof chunk === 'string' ? chunk : Buffer.from(chunk).toString());
    return true;
  };
  const spies = [process.stdout, process.stderr].map((stream) =>
    jest.spyOn(stream, 'write').mockImplementation(keep),
  );
  try {
    await work();
  } catch (error) {
    throw new Error(`the run broke off; it wrote:\n${lines.join('')}`, { cause: error });
  } finally {
    for (const spy of spies) spy.mockRestore();
  }
  return lines.join('');
}

const cookieOf = (reply: { headers: Record<string, unknown> }): string =>
  String(reply.headers['set-cookie']).split(';')[0].split('=')[1];

let app: TestApp | undefined;
afterEach(async () => {
  await app?.close();
  app = undefined;
});

describe('the log of a whole run at its loudest', () => {
  it('holds no password, no cookie, no session id and no key', async () => {
    const secrets = new Map<string, string>([
      ['password', TEST_PASSWORD],
      ['new password', NEW_PASSWORD],
      ['guess', GUESS],
    ]);
    const written = await writtenDuring(async () => {
      app = await TestApp.create({
        env: { NODE_ENV: 'production', LOG_LEVEL: 'debug', SESSION_SECRET: 's3cret'.repeat(8) },
      });
      secrets.set('session secret', 's3cret'.repeat(8));
      secrets.set('database password', new URL(app.database.appUrl).password);
      const vessel = await app.make.vessel();
      const rigger = await app.make.userOn(vessel, 'rigger', { firmId: vessel.firmId });
      const agent = app.agent();
      const signIn = (password: string, who: Agent = agent) =>
        who.post('/api/auth/sign-in').send({ email: rigger.email, password });
      await signIn(GUESS).expect(401);
      await agent
        .post('/api/auth/sign-in')
        .send({ email: rigger.email, password: [GUESS] })
        .expect(400);
      await agent
        .post('/api/auth/sign-in')
        .set('Content-Type', 'application/json')
        .send(`{"password":"${GUESS}`)
        .expect(400);
      await agent.get(`/api/auth/session?password=${encodeURIComponent(GUESS)}`);
      secrets.set('first cookie', cookieOf(await signIn(TEST_PASSWORD).expect(200)));
      const change = (currentPassword: string, newPassword: string) =>
        agent
          .post('/api/users/me/password')
          .set('Idempotency-Key', newId())
          .send({ currentPassword, newPassword });
      await change(GUESS, NEW_PASSWORD).expect(400);
      await change(TEST_PASSWORD, `${NEW_PASSWORD}\u0000`).expect(400);
      // An accident in the middle of the change, with everything the database driver likes to tell.
      const { admin } = app.database;
      await admin.query(
        `alter table app_user add constraint no_change check (password_hash not like '%')  not valid`,
      );
      await change(TEST_PASSWORD, NEW_PASSWORD).expect(500);
      await admin.query(`alter table app_user drop constraint no_change`);
      app.clock.advance({ minutes: 1 });
      secrets.set('second cookie', cookieOf(await change(TEST_PASSWORD, NEW_PASSWORD).expect(204)));
      const { rows } = await admin.query<{ sid: string; hash: string }>(
        `select sid, (select password_hash from app_user where id = $1) as hash from session`,
        [rigger.id],
      );
      rows.forEach(({ sid, hash }, n) => {
        secrets.set(`session id ${n}`, sid);
        secrets.set('password hash', hash);
      });
      // A store that fails, and an upload that breaks.
      await admin.query('alter table session rename to session_away');
      await agent.get('/api/vessels').expect(500);
      await admin.query('alter table session_away rename to session');
      await agent.post('/api/uploads').set(TUS).set('Upload-Length', '3').expect(400);
      await agent
        .patch('/api/uploads/none')
        .set(TUS)
        .expect((reply) => reply.status < 500);
      await agent.get('/api/vessels').set('Cookie', 'sid-0=s%3Aforged.signature').expect(200);
      await agent.post('/api/auth/sign-out').expect(204);
      for (let n = 0; n < 11; n++) await signIn(GUESS, app.agent());
    });
    // The run did write: a line per request, and the two accidents.
    expect(written).toContain('/api/users/me/password');
    expect(written).toContain('no_change');
    expect(secrets.size).toBeGreaterThanOrEqual(9);
    const found = [...secrets].filter(([, secret]) => {
      const forms = [
        secret,
        encodeURIComponent(secret),
        decodeURIComponent(secret),
        Buffer.from(secret).toString('base64'),
      ];
      return forms.some((form) => written.includes(form));
    });
    expect(found).toEqual([]);
  });
});
