import type { TestDatabase } from '@stayledger/backend/testing/test-database';
import { type TestRedisServer, startRedisServer } from '@stayledger/backend/testing/redis-server';
import type { SeededRandom } from '../../demo/seeded-random.js';
import { pause, type ProgramName, ServiceProcess } from './service-process.js';

/** Which processes the service consists of, and what of it can be killed. */
export interface Topology {
  start(): Promise<void>;
  untilReady(): Promise<void>;
  /**
   * Kills one thing and begins it again, without waiting for it.
   *
   * @param whileDown what to look at before it begins again
   * @returns what was killed
   */
  killSomething(random: SeededRandom, whileDown: () => void): Promise<string>;
  /** Asks all to end; what did not end as it should, in words. */
  stop(): Promise<string[]>;
  /** How often a process ended by itself while it started and was started again. */
  startsAgain(): number;
  /** What the processes logged as errors. */
  errors(): string[];
  /** Ends whatever runs, by force. */
  end(): Promise<void>;
}

const STOP_WITHIN_MS = 10_000;
/** Of the application's own connections, one that works if there is one. */
const BACKEND = `select pid from pg_stat_activity
  where datname = $1 and usename = 'stayledger_test_app' and pid <> pg_backend_pid()
  order by (state = 'active') desc, (state = 'idle in transaction') desc, md5(pid::text || $2)`;

/** Processes that are started from the build, killed, and started again. */
class Processes {
  private readonly errors: string[] = [];
  startsAgain = 0;
  private readonly running = new Map<string, { name: ProgramName; process: ServiceProcess }>();

  constructor(private readonly env: Record<string, string>) {}

  start(label: string, name: ProgramName): void {
    this.running.set(label, { name, process: ServiceProcess.start(name, this.env) });
  }

  /**
   * A process whose database dies in the very seconds of its start ends by itself; whoever keeps services running starts
   * it again, and so do we.
   */
  async untilReady(): Promise<void> {
    for (const [label, { name }] of this.running) {
      for (let tries = 1; ; tries += 1) {
        const { process } = this.running.get(label) ?? {};
        if (process === undefined || (await process.ready)) break;
        const { code, signal } = await process.ended;
        if (code !== 2 || tries === 5) {
          throw new Error(`${label} ended with ${code ?? signal} while it started: ${process.lastWords}`);
        }
        this.startsAgain += 1;
        this.start(label, name);
      }
    }
  }

  async kill(label: string, whileDown: () => void): Promise<string> {
    const known = this.running.get(label);
    if (known === undefined) throw new Error(`no process ${label}`);
    await known.process.kill();
    whileDown();
    this.errors.push(...known.process.errors);
    this.start(label, known.name);
    return known.name;
  }

  allErrors(): string[] {
    return [...this.errors, ...[...this.running.values()].flatMap(({ process }) => process.errors)];
  }

  async stop(): Promise<string[]> {
    const ends = [...this.running].map(async ([label, { process }]) => {
      const { code, signal, tookMs } = await process.stop();
      const fine = code === 0 && tookMs <= STOP_WITHIN_MS;
      return fine ? [] : [`${label} ended with ${code ?? signal} after ${tookMs} ms: ${process.lastWords}`];
    });
    return (await Promise.all(ends)).flat();
  }

  async end(): Promise<void> {
    for (const { process } of this.running.values()) if (process.running) await process.kill();
  }
}

/** Ends one connection of the application: by PostgreSQL's own means, or by killing its server process. */
async function killBackend(database: TestDatabase, random: SeededRandom): Promise<string> {
  const pid = await connectionOf(database, String(random.uniform()));
  if (random.uniform() < 0.5) {
    await database.admin.query('select pg_terminate_backend($1)', [pid]);
    return 'connection ended';
  }
  // PostgreSQL then ends every other connection too and recovers from its log.
  process.kill(pid, 'SIGKILL');
  await pause(200);
  return 'server process of a connection';
}

/** Waits for one, since a service that is starting has none yet, nor a database that recovers. */
async function connectionOf(database: TestDatabase, chance: string): Promise<number> {
  for (let waited = 0; waited < 60_000; waited += 50) {
    const found = await database.admin
      .query<{ pid: number }>(BACKEND, [database.name, chance])
      .catch(() => null);
    if (found?.rows.length) return found.rows[0].pid;
    await pause(50);
  }
  throw new Error('the service has no connection to its database');
}

/** API, web and jobs in one process, the queue within it. */
export async function allInOne({
  env,
  database,
}: {
  env: Record<string, string>;
  database: TestDatabase;
}): Promise<Topology> {
  const processes = new Processes(env);
  return {
    start: async () => processes.start('all-in-one', 'all-in-one'),
    untilReady: () => processes.untilReady(),
    async killSomething(random, whileDown) {
      if (random.uniform() < 0.75) return processes.kill('all-in-one', whileDown);
      return killBackend(database, random);
    },
    stop: () => processes.stop(),
    startsAgain: () => processes.startsAgain,
    errors: () => processes.allErrors(),
    end: () => processes.end(),
  };
}

/** The API, two workers and a Redis server between them. */
export async function severalProcesses({
  env,
  database,
}: {
  env: Record<string, string>;
  database: TestDatabase;
}): Promise<Topology> {
  let redis: TestRedisServer = await startRedisServer();
  const port = Number(new URL(redis.url).port);
  const processes = new Processes({ ...env, REDIS_URL: redis.url });
  return {
    async start() {
      processes.start('api', 'api');
      processes.start('worker 1', 'worker');
      processes.start('worker 2', 'worker');
    },
    untilReady: () => processes.untilReady(),
    async killSomething(random, whileDown) {
      const chance = random.uniform();
      if (chance < 0.3) return processes.kill('api', whileDown);
      if (chance < 0.6) return processes.kill(random.uniform() < 0.5 ? 'worker 1' : 'worker 2', whileDown);
      if (chance < 0.75) {
        await redis.stop();
        await pause(random.between(0, 1500));
        redis = await startRedisServer(port);
        return 'redis';
      }
      if (chance < 0.85) {
        await redis.flushAll();
        return 'everything in redis';
      }
      return killBackend(database, random);
    },
    stop: () => processes.stop(),
    startsAgain: () => processes.startsAgain,
    errors: () => processes.allErrors(),
    async end() {
      await processes.end();
      await redis.stop();
    },
  };
}
