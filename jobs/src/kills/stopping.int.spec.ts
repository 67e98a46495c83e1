import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Clock } from '@stayledger/backend/persistence';
import { type TestRedisServer, startRedisServer } from '@stayledger/backend/testing/redis-server';
import { Factories } from '@stayledger/backend/testing/factories';
import { createTestDatabase, type TestDatabase } from '@stayledger/backend/testing/test-database';
import { SeededRandom } from '../demo/seeded-random.js';
import { planLogs } from '../testing/kills/log-plan.js';
import { anyFreePort, pause, type ProgramName, ServiceProcess } from '../testing/kills/service-process.js';
import { VesselUnderFire } from '../testing/kills/vessel-under-fire.js';

jest.setTimeout(240_000);

const STOP_WITHIN_MS = 10_000;

describe('a service that is told to end', () => {
  let database: TestDatabase;
  let redis: TestRedisServer;
  let dataFolder: string;
  let env: Record<string, string>;
  const started: ServiceProcess[] = [];

  beforeAll(async () => {
    database = await createTestDatabase();
    redis = await startRedisServer();
    dataFolder = await mkdtemp(join(tmpdir(), 'stayledger-stopping-'));
    env = {
      DATABASE_APP_URL: database.appUrl,
      STAYLEDGER_DATA: dataFolder,
      SESSION_SECRET: 'a session secret for tests of stopping alone',
      PORT: String(await anyFreePort()),
      COUNTING_THREADS: '1',
      LOG_LEVEL: 'info',
    };
  });
  afterAll(async () => {
    for (const process of started) if (process.running) await process.kill();
    await redis?.stop();
    await database?.drop();
    await rm(dataFolder, { recursive: true, force: true });
  });

  function start(name: ProgramName, extra: Record<string, string> = {}): ServiceProcess {
    const process = ServiceProcess.start(name, { ...env, ...extra });
    started.push(process);
    return process;
  }

  it.each(['all-in-one', 'api', 'worker'] as const)(
    'ends with status 0 while it is still starting: %s',
    async (name) => {
      const random = new SeededRandom(`stopping ${name}`);
      for (let i = 0; i < 3; i++) {
        const process = start(name, { REDIS_URL: redis.url, PORT: '0' });
        await process.untilItListensToSignals();
        await pause(random.between(0, 2500));
        expect(await process.stop()).toMatchObject({ code: 0, signal: null });
      }
    },
  );

  it('ends with status 0 within ten seconds in the middle of uploads and counts, and goes on afterwards', async () => {
    const make = new Factories(database.admin, new Clock());
    const plan = planLogs().filter(({ cancelled }) => !cancelled);
    const url = `http://127.0.0.1:${env.PORT}`;
    await start('all-in-one').untilReady();
    const filesFolder = join(dataFolder, 'files');
    const vessel = await VesselUnderFire.create({ url, make, filesFolder });
    const lives = vessel.live(plan);
    for (let i = 0; i < 3; i++) {
      const running = started[started.length - 1];
      await pause(700);
      const { code, tookMs } = await running.stop();
      expect({ code, inTime: tookMs < STOP_WITHIN_MS }).toEqual({ code: 0, inTime: true });
      await start('all-in-one').untilReady();
    }
    await lives;
    expect([...vessel.violations, ...vessel.client.oddReplies]).toEqual([]);
    const { rows } = await database.admin.query('select distinct state from load_log');
    expect(rows).toEqual([{ state: 'posted' }]);
    // A stop on purpose is no failed try.
    expect(vessel.readAgain).toBe(0);
  });
});
