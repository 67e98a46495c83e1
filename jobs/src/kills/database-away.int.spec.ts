import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Clock } from '@stayledger/backend/persistence';
import { type TestRedisServer, startRedisServer } from '@stayledger/backend/testing/redis-server';
import { Factories, TEST_PASSWORD } from '@stayledger/backend/testing/factories';
import { createTestDatabase, type TestDatabase } from '@stayledger/backend/testing/test-database';
import { planLogs } from '../testing/kills/log-plan.js';
import { OwnCluster } from '../testing/kills/own-cluster.js';
import { anyFreePort, pause, ServiceProcess } from '../testing/kills/service-process.js';
import { VesselUnderFire } from '../testing/kills/vessel-under-fire.js';

jest.setTimeout(240_000);

/** Half a minute when a restart of PostgreSQL is to be played in full; the answer is the same after a few seconds. */
const AWAY_MS = Number(process.env.STAYLEDGER_AWAY_MS ?? 6000);

describe('what the service stands on goes away', () => {
  let cluster: OwnCluster;
  let database: TestDatabase;
  let redis: TestRedisServer;
  let dataFolder: string;
  let env: Record<string, string>;
  let make: Factories;
  let running: ServiceProcess[] = [];
  /** Brings back what a failed test left away. */
  let onTestEnd = async (): Promise<void> => undefined;

  beforeAll(async () => {
    cluster = await OwnCluster.start();
    database = await createTestDatabase();
    redis = await startRedisServer();
    make = new Factories(database.admin, new Clock());
    dataFolder = await mkdtemp(join(tmpdir(), 'stayledger-away-'));
  });
  beforeEach(async () => {
    env = {
      DATABASE_APP_URL: database.appUrl,
      STAYLEDGER_DATA: dataFolder,
      SESSION_SECRET: 'a session secret for tests of absence alone',
      PORT: String(await anyFreePort()),
      COUNTING_THREADS: '1',
    };
  });
  afterEach(async () => {
    await onTestEnd();
    const ends = await Promise.all(running.map((process) => process.stop()));
    const names = running.map(({ name }) => name);
    running = [];
    expect(ends.map(({ code }, i) => [names[i], code])).toEqual(names.map((name) => [name, 0]));
  });
  afterAll(async () => {
    await redis?.stop();
    await database?.drop();
    await cluster?.end();
    await rm(dataFolder, { recursive: true, force: true });
  });

  async function start(...names: ('all-in-one' | 'api' | 'worker')[]): Promise<void> {
    running = names.map((name) => ServiceProcess.start(name, env));
    for (const process of running) await process.untilReady();
  }

  function launch(): Promise<VesselUnderFire> {
    const url = `http://127.0.0.1:${env.PORT}`;
    return VesselUnderFire.create({ url, make, filesFolder: join(dataFolder, 'files') });
  }

  async function expectAllPosted(vessel: VesselUnderFire): Promise<void> {
    expect([...vessel.violations, ...vessel.client.oddReplies]).toEqual([]);
    const { rows } = await database.admin.query('select distinct state from load_log where vessel_id = $1', [
      vessel.vesselId,
    ]);
    expect(rows).toEqual([{ state: 'posted' }]);
    expect(running.flatMap(({ errors }) => errors)).toEqual([]);
  }

  it('PostgreSQL: everybody is told when to come back, and the service goes on by itself', async () => {
    await start('all-in-one');
    const vessel = await launch();
    const plan = planLogs().filter(({ cancelled }) => !cancelled);
    const lives = vessel.live(plan);
    // Awaited at the end; until then a failure is not to end the test process.
    lives.catch(() => undefined);
    await pause(1500);
    await cluster.stop();
    onTestEnd = () => cluster.resume();
    const awayUntil = performance.now() + AWAY_MS;
    const questions = [
      ['GET', '/api/health'],
      // No more of these than one address may ask in a minute.
      ...Array.from({ length: 5 }, () => ['POST', '/api/auth/sign-in']),
    ];
    let rest = [...questions];
    while (performance.now() < awayUntil || rest.length > 0) {
      for (const [method, path] of rest.length > 0 ? rest : questions.slice(0, 1)) {
        const reply = await fetch(`http://127.0.0.1:${env.PORT}${path}`, {
          method,
          headers: {
            'Sec-Fetch-Site': 'same-origin',
            'X-Requested-By': 'stayledger',
            'Content-Type': 'application/json',
          },
          body:
            method === 'GET' ? undefined : JSON.stringify({ email: 'a@b.example', password: TEST_PASSWORD }),
        });
        expect([method, path, reply.status]).toEqual([method, path, 503]);
        expect(Number(reply.headers.get('retry-after'))).toBeGreaterThan(0);
        expect(await reply.json()).toMatchObject({ code: 'unavailable' });
      }
      rest = [];
      await pause(300);
    }
    onTestEnd = async () => undefined;
    await cluster.resume();
    await lives;
    await expectAllPosted(vessel);
    expect(running[0].running).toBe(true);
  });

  it('Redis: what was in it is found again, and nobody waits for its return to be answered', async () => {
    env.REDIS_URL = redis.url;
    await start('api', 'worker', 'worker');
    const vessel = await launch();
    const plan = planLogs().filter(({ cancelled }) => !cancelled);
    const before = plan.slice(0, 2);
    await redis.flushAll();
    await vessel.live(before);
    const port = Number(new URL(redis.url).port);
    await redis.stop();
    const lives = vessel.live(plan.slice(2));
    const from = performance.now();
    const health = await vessel.client.askOnce({ method: 'GET', path: '/api/health' });
    expect(health?.status).toBe(200);
    expect(performance.now() - from).toBeLessThan(5000);
    await pause(4000);
    redis = await startRedisServer(port);
    await lives;
    await expectAllPosted(vessel);
    // Each job was begun once: the one worker that was woken did it, and the other left it alone.
    const { rows } = await database.admin.query(
      'select distinct attempts, state from job where vessel_id = $1',
      [vessel.vesselId],
    );
    expect(rows).toEqual([{ attempts: 1, state: 'done' }]);
  });
});
