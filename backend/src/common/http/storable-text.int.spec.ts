import { newId } from '../ids/new-id.js';
import { TestApp, type Agent } from '../../testing/test-app.js';

let app: TestApp;
let agent: Agent;
let vesselPath: string;

beforeAll(async () => {
  app = await TestApp.create();
  const vessel = await app.make.vessel();
  agent = await app.signIn(await app.make.userOn(vessel, 'rigger', { firmId: vessel.firmId }));
  vesselPath = `/api/vessels/${vessel.id}`;
});
afterAll(() => app?.close());

describe('text that no database stores', () => {
  it.each([
    ['a NUL', 'left\u0000right'],
    ['the first half of a character', 'left\ud83d'],
    ['the second half of a character', '\ude00right'],
  ])('is refused at its field: %s', async (_what, text) => {
    const body = await agent.patch(vesselPath).send({ version: 1, notes: text }).expect(400);
    expect(body.body).toMatchObject({
      code: 'invalid-request',
      fieldErrors: { notes: [expect.any(String)] },
    });
    const nested = await agent
      .post(`${vesselPath}/load-logs`)
      .send({ fileName: 'a', sizeBytes: 1, mapping: { channels: [{ column: text }] } })
      .expect(400);
    expect(Object.keys(nested.body.fieldErrors)).toEqual(['mapping.channels.0.column']);
    await app
      .agent()
      .post('/api/auth/sign-in')
      .send({ email: `${text}@example.test`, password: 'x' })
      .expect(400);
    await agent
      .patch(vesselPath)
      .send({ version: 1, [text]: 1 })
      .expect(400);
  });

  it('is refused in a query too', async () => {
    const reply = await agent.get('/api/vessels?q=%00').expect(400);
    expect(reply.body.fieldErrors).toHaveProperty('q');
  });

  it('is told from what merely looks odd', async () => {
    const notes = 'Tęczowy 🌈 \u202e right to left \u0007\ttab';
    const reply = await agent.patch(vesselPath).send({ version: 1, notes }).expect(200);
    expect(reply.body.notes).toBe(notes);
  });
});

describe('a body nested without end', () => {
  it('is refused before anything walks it, with and without a key', async () => {
    const deep = `{"notes":${'['.repeat(100_000)}${']'.repeat(100_000)}}`;
    const send = () => agent.post('/api/vessels').set('Content-Type', 'application/json');
    await send().send(deep).expect(400);
    await send().set('Idempotency-Key', newId()).send(deep).expect(400);
  });
});
