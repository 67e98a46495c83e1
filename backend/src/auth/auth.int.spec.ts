import { TEST_PASSWORD } from '../testing/factories.js';
import { TestApp } from '../testing/test-app.js';
import { HousekeepingService } from './housekeeping.service.js';

let app: TestApp;

beforeAll(async () => {
  app = await TestApp.create();
});
afterAll(() => app?.close());

const signedIn = async (agent: ReturnType<TestApp['agent']>): Promise<boolean> =>
  (await agent.get('/api/auth/session').expect(200)).body.signedIn;

describe('signing in', () => {
  it('answers signed-out people with a session that says so, and stores none', async () => {
    const reply = await app.agent().get('/api/auth/session').expect(200);
    expect(reply.body).toEqual({ signedIn: false, user: null, roles: [], permissions: [] });
    expect(reply.headers['set-cookie']).toBeUndefined();
  });

  it('tells who is signed in and in which capacity', async () => {
    const rigger = await app.make.member('rigger');
    const agent = await app.signIn(rigger);
    const { body } = await agent.get('/api/auth/session').expect(200);
    expect(body.user).toMatchObject({ id: rigger.id, email: rigger.email, name: rigger.name });
    expect(body.roles).toEqual([{ role: 'rigger', firmId: rigger.firmId, firmName: expect.any(String) }]);
    expect(body.permissions).toContain('vessels:register');
    expect(JSON.stringify(body)).not.toContain('argon2');
  });

  it('takes the address in any case and with spaces around it', async () => {
    const person = await app.make.person({ email: 'kari@example.test' });
    await app.signIn({ email: `  ${person.email.toUpperCase()} ` });
  });

  it('sets a cookie that scripts cannot read and other sites do not send', async () => {
    const person = await app.make.person();
    const reply = await app
      .agent()
      .post('/api/auth/sign-in')
      .send({ email: person.email, password: TEST_PASSWORD })
      .expect(200);
    const [cookie] = reply.headers['set-cookie'];
    expect(cookie).toMatch(/^sid-0=/);
    expect(cookie).toMatch(/; HttpOnly/);
    expect(cookie).toMatch(/; SameSite=Lax/);
    expect(cookie).toMatch(/; Path=\//);
    expect(cookie).not.toMatch(/; Domain/);
  });

  it('gives the same answer to an unknown address, a wrong password and a closed account', async () => {
    const known = await app.make.person();
    const closed = await app.make.person({ active: false });
    const attempts = [
      { email: known.email, password: 'not the password' },
      { email: 'nobody@example.test', password: TEST_PASSWORD },
      { email: closed.email, password: TEST_PASSWORD },
    ];
    const replies = [];
    for (const attempt of attempts) {
      const { body, headers } = await app.agent().post('/api/auth/sign-in').send(attempt).expect(401);
      expect(headers['set-cookie']).toBeUndefined();
      replies.push({ ...body, requestId: '' });
    }
    expect(replies[0].code).toBe('wrong-credentials');
    expect(replies[1]).toEqual(replies[0]);
    expect(replies[2]).toEqual(replies[0]);
  });

  it('does the same work for an unknown address as for a wrong password', async () => {
    const known = await app.make.person();
    const timeOf = async (email: string): Promise<number> => {
      const begun = performance.now();
      await app.agent().post('/api/auth/sign-in').send({ email, password: 'not the password' }).expect(401);
      return performance.now() - begun;
    };
    await timeOf(known.email);
    let shortest = { known: Infinity, unknown: Infinity };
    for (let round = 0; round < 4; round++) {
      shortest = {
        known: Math.min(shortest.known, await timeOf(known.email)),
        unknown: Math.min(shortest.unknown, await timeOf(`nobody-${round}@example.test`)),
      };
    }
    // Without the hash of a decoy the unknown address takes a tenth of the time, not half.
    expect(shortest.unknown).toBeGreaterThan(shortest.known / 2);
  });

  it('names what is missing instead of trying it', async () => {
    const { body } = await app.agent().post('/api/auth/sign-in').send({ email: 'a@b.example' }).expect(400);
    expect(body).toMatchObject({ code: 'invalid-request', fieldErrors: { password: [expect.any(String)] } });
  });
});

describe('a session', () => {
  it('gets a new id at sign-in, so that a planted one is worthless', async () => {
    const person = await app.make.person();
    const agent = app.agent();
    const signIn = () =>
      agent.post('/api/auth/sign-in').send({ email: person.email, password: TEST_PASSWORD });
    const first = (await signIn().expect(200)).headers['set-cookie'][0].split(';')[0];
    const second = (await signIn().expect(200)).headers['set-cookie'][0].split(';')[0];
    expect(second).not.toBe(first);
    expect(await signedIn(app.agent().set('Cookie', first))).toBe(false);
  });

  it('ends on the server at sign-out', async () => {
    const person = await app.make.person();
    const agent = app.agent();
    const reply = await agent
      .post('/api/auth/sign-in')
      .send({ email: person.email, password: TEST_PASSWORD });
    const cookie = reply.headers['set-cookie'][0].split(';')[0];
    await agent.post('/api/auth/sign-out').expect(204);
    expect(await signedIn(app.agent().set('Cookie', cookie))).toBe(false);
    await agent.post('/api/auth/sign-out').expect(401);
  });

  it('ends after seven days, however busy it was', async () => {
    const agent = await app.signIn(await app.make.person());
    // A request each seven hours and a half: never idle for eight.
    for (let hours = 7.5; hours < 7 * 24; hours += 7.5) {
      app.clock.advance({ hours: 7.5 });
      expect(await signedIn(agent)).toBe(true);
    }
    app.clock.advance({ hours: 7.5 });
    expect(await signedIn(agent)).toBe(false);
  });

  it('ends after eight idle hours, counted from the last request', async () => {
    const agent = await app.signIn(await app.make.person());
    for (let n = 0; n < 2; n++) {
      app.clock.advance({ hours: 7, minutes: 59 });
      expect(await signedIn(agent)).toBe(true);
    }
    app.clock.advance({ hours: 8 });
    expect(await signedIn(agent)).toBe(false);
  });

  it('does not come back when it was ended during a request', async () => {
    const person = await app.make.person();
    const agent = await app.signIn(person);
    // The row is locked, so that the request hangs at its end, where it prolongs the session.
    const client = await app.database.admin.connect();
    try {
      await client.query('begin');
      await client.query(`delete from session where sess -> 'passport' -> 'user' ->> 'userId' = $1`, [
        person.id,
      ]);
      const hanging = agent.get('/api/auth/session').then(({ status }) => status);
      await new Promise((resolve) => setTimeout(resolve, 300));
      await client.query('commit');
      expect(await hanging).toBe(200);
    } finally {
      client.release();
    }
    const { rowCount } = await app.database.admin.query(
      `select 1 from session where sess -> 'passport' -> 'user' ->> 'userId' = $1`,
      [person.id],
    );
    expect(rowCount).toBe(0);
    expect(await signedIn(agent)).toBe(false);
  });

  it('ends when the person is deactivated', async () => {
    const person = await app.make.person();
    const agent = await app.signIn(person);
    await app.database.admin.query('update app_user set active = false where id = $1', [person.id]);
    expect(await signedIn(agent)).toBe(false);
  });

  it('loses a role at the next request after the membership ended', async () => {
    const rigger = await app.make.member('rigger');
    const agent = await app.signIn(rigger);
    await agent.get('/api/vessels').expect(200);
    await app.database.admin.query('update membership set ended_at = now() where user_id = $1', [rigger.id]);
    await agent.get('/api/vessels').expect(403);
  });

  it('is swept away when it has run out', async () => {
    await app.signIn(await app.make.person());
    app.clock.advance({ days: 2 });
    await app.nest.get(HousekeepingService).prune();
    const { rows } = await app.database.admin.query(
      'select (select count(*)::int from session) as sessions, (select count(*)::int from sign_in_attempt) as attempts',
    );
    expect(rows[0]).toEqual({ sessions: 0, attempts: 0 });
  });
});

describe('changing the password', () => {
  it('ends every other session and keeps the one that asked', async () => {
    const person = await app.make.person();
    const here = await app.signIn(person);
    const elsewhere = await app.signIn(person);
    app.clock.advance({ minutes: 1 });
    const newPassword = 'an entirely different password';
    await here
      .post('/api/users/me/password')
      .send({ currentPassword: TEST_PASSWORD, newPassword })
      .expect(204);
    expect(await signedIn(here)).toBe(true);
    expect(await signedIn(elsewhere)).toBe(false);
    await app
      .agent()
      .post('/api/auth/sign-in')
      .send({ email: person.email, password: TEST_PASSWORD })
      .expect(401);
    await app.signIn(person, newPassword);
  });

  it('asks for the current one', async () => {
    const agent = await app.signIn(await app.make.person());
    const { body } = await agent
      .post('/api/users/me/password')
      .send({ currentPassword: 'guessed', newPassword: 'an entirely different password' })
      .expect(400);
    expect(body.fieldErrors).toHaveProperty('currentPassword');
  });
});

describe('guessing', () => {
  it('stops for an account after ten failures, even with the right password, and opens again in time', async () => {
    const person = await app.make.person();
    const attempt = (password: string) =>
      app.agent().post('/api/auth/sign-in').send({ email: person.email, password });
    for (let n = 0; n < 10; n++) await attempt(`guess ${n}`).expect(401);
    await attempt(TEST_PASSWORD).expect(429);
    app.clock.advance({ minutes: 16 });
    await attempt(TEST_PASSWORD).expect(200);
  });

  it('counts guesses that come all at once', async () => {
    const person = await app.make.person();
    const replies = await Promise.all(
      Array.from({ length: 14 }, (_, n) =>
        app
          .agent()
          .post('/api/auth/sign-in')
          .send({ email: person.email, password: `guess ${n}` }),
      ),
    );
    const statuses = replies.map(({ status }) => status);
    expect(statuses.filter((status) => status === 401).length).toBeLessThanOrEqual(10);
    expect(new Set(statuses)).toEqual(new Set([401, 429]));
  });

  it('says when to come back', async () => {
    const person = await app.make.person();
    const attempt = () =>
      app.agent().post('/api/auth/sign-in').send({ email: person.email, password: 'wrong' });
    for (let n = 0; n < 10; n++) await attempt().expect(401);
    app.clock.advance({ minutes: 5 });
    const reply = await attempt().expect(429);
    expect(reply.body.code).toBe('too-many-attempts');
    expect(Number(reply.headers['retry-after'])).toBe(600);
  });

  it('counts anew after a success', async () => {
    const person = await app.make.person();
    const attempt = (password: string) =>
      app.agent().post('/api/auth/sign-in').send({ email: person.email, password });
    for (let n = 0; n < 9; n++) await attempt('wrong').expect(401);
    app.clock.advance({ seconds: 1 });
    await attempt(TEST_PASSWORD).expect(200);
    app.clock.advance({ seconds: 1 });
    for (let n = 0; n < 9; n++) await attempt('wrong').expect(401);
  });

  it('keeps no address in the clear', async () => {
    const person = await app.make.person();
    await app.signIn(person);
    const { rows } = await app.database.admin.query('select account_key from sign_in_attempt');
    expect(rows.length).toBeGreaterThan(0);
    for (const { account_key } of rows) expect(account_key).toMatch(/^[0-9a-f]{64}$/);
  });
});

it('slows one network address down, whatever the account', async () => {
  const strict = await TestApp.create({ limits: { guessesPerMinute: 3 } });
  try {
    const attempt = (n: number) =>
      strict
        .agent()
        .post('/api/auth/sign-in')
        .send({ email: `somebody-${n}@example.test`, password: 'wrong' });
    for (let n = 0; n < 3; n++) await attempt(n).expect(401);
    const reply = await attempt(3).expect(429);
    expect(reply.body).toMatchObject({ code: 'too-many-attempts', requestId: expect.any(String) });
    await strict.agent().get('/api/auth/session').expect(200);
  } finally {
    await strict.close();
  }
});
