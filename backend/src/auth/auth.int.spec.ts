import { TestApp } from '../testing/test-app.js';

let app: TestApp;

beforeAll(async () => {
  app = await TestApp.create();
});
afterAll(() => app?.close());

describe('signing in', () => {
  it('answers signed-out people with a session that says so', async () => {
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
});
