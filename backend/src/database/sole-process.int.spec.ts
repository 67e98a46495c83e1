import { createTestDatabase, type TestDatabase } from '../testing/test-database.js';
import { AnotherProcessError, becomeSoleProcess } from './sole-process.js';

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});
afterAll(() => database?.drop());

const HOLDER = `select pid from pg_stat_activity where datname = current_database() and application_name = 'stayledger sole process'`;

function unexpected(): void {
  throw new Error('the lock was not to be lost');
}

async function eventually(check: () => Promise<boolean>): Promise<void> {
  const deadline = performance.now() + 15_000;
  while (!(await check())) {
    if (performance.now() > deadline) throw new Error('it did not happen within 15 s');
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

describe('becomeSoleProcess', () => {
  it('lets one process in at a time', async () => {
    const first = await becomeSoleProcess(database.appUrl, unexpected);
    await expect(becomeSoleProcess(database.appUrl, unexpected)).rejects.toThrow(AnotherProcessError);
    await first.release();
    const second = await becomeSoleProcess(database.appUrl, unexpected);
    await second.release();
  });

  it('takes the lock again after the database cut the connection', async () => {
    const held = await becomeSoleProcess(database.appUrl, unexpected);
    const [{ pid }] = (await database.admin.query(HOLDER)).rows;
    await database.admin.query('select pg_terminate_backend($1)', [pid]);
    await eventually(async () => {
      const { rows } = await database.admin.query(
        `select 1 from pg_locks l join pg_stat_activity a on a.pid = l.pid
          where l.locktype = 'advisory' and a.pid <> $1 and a.datname = current_database()`,
        [pid],
      );
      return rows.length === 1;
    });
    await expect(becomeSoleProcess(database.appUrl, unexpected)).rejects.toThrow(AnotherProcessError);
    await held.release();
  }, 30_000);

  it('says so when another process was faster', async () => {
    let lost = 0;
    const held = await becomeSoleProcess(database.appUrl, () => {
      lost += 1;
    });
    const [{ pid }] = (await database.admin.query(HOLDER)).rows;
    await database.admin.query('select pg_terminate_backend($1)', [pid]);
    const rival = await becomeSoleProcess(database.appUrl, unexpected);
    await eventually(async () => lost === 1);
    await rival.release();
    await held.release();
  }, 30_000);
});
