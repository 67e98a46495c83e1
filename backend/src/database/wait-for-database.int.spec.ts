import { createServer } from 'node:net';
import { createTestDatabase, type TestDatabase } from '../testing/test-database.js';
import { waitForDatabase } from './wait-for-database.js';

describe('waitForDatabase', () => {
  let database: TestDatabase;
  beforeAll(async () => {
    database = await createTestDatabase();
  });
  afterAll(() => database?.drop());

  it('goes on at once when the database answers', async () => {
    let waited = 0;
    await waitForDatabase(database.appUrl, () => (waited += 1));
    expect(waited).toBe(0);
  });

  it('waits while connections are refused, says so once, and goes on when they are not', async () => {
    await database.admin.query(`alter database ${database.name} connection limit 0`);
    let waited = 0;
    const waiting = waitForDatabase(database.appUrl, () => (waited += 1));
    await new Promise((resolve) => setTimeout(resolve, 1200));
    await database.admin.query(`alter database ${database.name} connection limit -1`);
    await waiting;
    expect(waited).toBe(1);
  });

  it('gives up after its time', async () => {
    const probe = createServer();
    const port = await new Promise<number>((resolve) => {
      probe.listen(0, '127.0.0.1', () => resolve((probe.address() as { port: number }).port));
    });
    await new Promise((resolve) => probe.close(resolve));
    const url = `postgres://nobody@127.0.0.1:${port}/nothing`;
    await expect(waitForDatabase(url, () => undefined, 700)).rejects.toMatchObject({ code: 'ECONNREFUSED' });
  });

  it('does not wait for what waiting does not mend', async () => {
    const url = new URL(database.appUrl);
    url.password = 'not the password';
    let waited = 0;
    await expect(waitForDatabase(url.href, () => (waited += 1))).rejects.toMatchObject({ code: '28P01' });
    expect(waited).toBe(0);
  });
});
