import type { TestUser } from '../../testing/factories.js';
import { TestApp, type Agent } from '../../testing/test-app.js';
import { newId } from '../ids/new-id.js';

let app: TestApp;
let rigger: TestUser;
let agent: Agent;

beforeAll(async () => {
  app = await TestApp.create();
  rigger = await app.make.member('rigger');
  agent = await app.signIn(rigger);
});
afterAll(() => app?.close());

const register = (who: Agent, key: string, name: string) =>
  who
    .post('/api/vessels')
    .set('Idempotency-Key', key)
    .send({ name, rigType: 'cutter', zone: 'Europe/Oslo', firmId: rigger.firmId });

async function countOf(name: string): Promise<number> {
  const { rowCount } = await app.database.admin.query('select 1 from vessel where name = $1', [name]);
  return rowCount ?? 0;
}

describe('a key for one deed', () => {
  it('does it once when the request comes six times at the same moment, and gives six times the same reply', async () => {
    const key = newId();
    const replies = await Promise.all(Array.from({ length: 6 }, () => register(agent, key, 'Once')));
    expect(new Set(replies.map(({ status }) => status))).toEqual(new Set([201]));
    for (const { body } of replies) expect(body).toEqual(replies[0].body);
    expect(await countOf('Once')).toBe(1);
  });

  it('is not taken for another deed', async () => {
    const key = newId();
    await register(agent, key, 'First deed').expect(201);
    const refused = await register(agent, key, 'Second deed');
    expect(refused.status).toBeGreaterThanOrEqual(400);
    expect(refused.status).toBeLessThan(500);
    expect(refused.body.code).toBe('idempotency-mismatch');
    expect(await countOf('Second deed')).toBe(0);
  });

  it('belongs to one person: the same key of another is another', async () => {
    const key = newId();
    const other = await app.signIn(await app.make.member('rigger', { firmId: rigger.firmId ?? undefined }));
    const mine = await register(agent, key, 'Shared key').expect(201);
    const theirs = await register(other, key, 'Shared key').expect(201);
    expect(theirs.body.id).not.toBe(mine.body.id);
    expect(await countOf('Shared key')).toBe(2);
  });

  it('must be a UUID', async () => {
    const refused = await register(agent, 'again', 'Keyless').expect(400);
    expect(refused.body.fieldErrors).toHaveProperty('Idempotency-Key');
    expect(await countOf('Keyless')).toBe(0);
  });
});
