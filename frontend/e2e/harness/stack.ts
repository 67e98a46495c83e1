import { execFile, spawn, type ChildProcess } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';

/**
 * The whole product for one browser test file: a database of its own in the throw-away cluster, migrated and seeded
 * with the demo, and the built all-in-one server on a free port.
 */
export interface Stack {
  baseUrl: string;
  /** The last lines the server wrote, for a failing test's message. */
  serverLog(): string;
  stop(): Promise<void>;
}

interface DatabaseClient {
  query(sql: string): Promise<unknown>;
}
interface ClusterModule {
  withConnection<T>(url: string, work: (client: DatabaseClient) => Promise<T>): Promise<T>;
}

const ROOT = fileURLToPath(new URL('../../../', import.meta.url));
const READY = /stayledger: ready on (http:\/\/\S+)/;
const START_LIMIT_MS = 90_000;
const STOP_LIMIT_MS = 15_000;
const execute = promisify(execFile);

function adminUrl(): URL {
  const given = process.env.TEST_DATABASE_ADMIN_URL;
  if (given) return new URL(given);
  const note = join(tmpdir(), 'stayledger-dev-cluster.json');
  if (!existsSync(note)) {
    throw new Error(
      'No test database. Run `node backend/setup/dev-cluster.mjs`, or `npm test` for everything.',
    );
  }
  return new URL((JSON.parse(readFileSync(note, 'utf8')) as { adminUrl: string }).adminUrl);
}

/** Both roles of a throw-away cluster carry the administrator's password. */
function urlFor(role: string, database: string): string {
  const url = adminUrl();
  url.username = role;
  url.pathname = `/${database}`;
  return url.href;
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once('error', reject);
    server.listen(0, '127.0.0.1', () => {
      const address = server.address();
      server.close(() =>
        typeof address === 'object' && address ? resolve(address.port) : reject(new Error('No port')),
      );
    });
  });
}

async function onCluster(work: (client: DatabaseClient) => Promise<void>): Promise<void> {
  // Plain JavaScript of the set-up scripts; a computed address keeps the type checker from asking for its types.
  const address = new URL('../../../backend/setup/postgres-cluster.mjs', import.meta.url).href;
  const { withConnection } = (await import(/* @vite-ignore */ address)) as ClusterModule;
  await withConnection(adminUrl().href, work);
}

function waitUntilReady(child: ChildProcess, log: string[]): Promise<string> {
  return new Promise((resolve, reject) => {
    const give = (message: string): void => reject(new Error(`${message}\n${log.join('')}`));
    const timer = setTimeout(() => give('The server did not become ready in time.'), START_LIMIT_MS);
    const read = (chunk: Buffer): void => {
      log.push(chunk.toString());
      if (log.length > 200) log.shift();
      const found = READY.exec(log.join(''));
      if (!found) return;
      clearTimeout(timer);
      resolve(found[1]);
    };
    child.stdout?.on('data', read);
    child.stderr?.on('data', read);
    child.once('exit', (code) => {
      clearTimeout(timer);
      give(`The server ended before it was ready (code ${code}).`);
    });
  });
}

export async function startStack(): Promise<Stack> {
  const database = `e2e_${process.pid}_${randomBytes(4).toString('hex')}`;
  const dataFolder = mkdtempSync(join(tmpdir(), 'stayledger-e2e-'));
  const env: NodeJS.ProcessEnv = {
    ...process.env,
    NODE_ENV: 'production',
    HOST: '127.0.0.1',
    PORT: String(await freePort()),
    DATABASE_OWNER_URL: urlFor('stayledger_owner', database),
    DATABASE_APP_URL: urlFor('stayledger_app', database),
    STAYLEDGER_DATA: dataFolder,
    STAYLEDGER_DEMO: '1',
    SESSION_SECRET: randomBytes(32).toString('hex'),
    COUNTING_THREADS: '1',
    LOG_LEVEL: 'warn',
    REDIS_URL: '',
    // Each visitor names an address of its own, as behind a proxy; see newVisitor.
    TRUST_PROXY: '1',
  };
  const log: string[] = [];
  let server: ChildProcess | undefined;

  const stop = async (): Promise<void> => {
    if (server && server.exitCode === null && server.signalCode === null) {
      const ended = new Promise<void>((resolve) => server?.once('exit', () => resolve()));
      server.kill('SIGTERM');
      const timer = setTimeout(() => server?.kill('SIGKILL'), STOP_LIMIT_MS);
      await ended;
      clearTimeout(timer);
    }
    await onCluster(async (client) => {
      await client.query(`drop database if exists ${database} with (force)`);
    });
    rmSync(dataFolder, { recursive: true, force: true });
  };

  try {
    await onCluster(async (client) => {
      await client.query(`create database ${database} owner stayledger_owner`);
    });
    await execute('node', ['backend/dist/database/migrate.cli.js'], { cwd: ROOT, env });
    await execute('node', ['backend/dist/database/seed.cli.js', '--reference'], { cwd: ROOT, env });
    await execute('node', ['backend/dist/database/seed.cli.js', '--demo'], { cwd: ROOT, env });
    server = spawn('node', ['jobs/dist/all-in-one.js'], {
      cwd: ROOT,
      env,
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    const baseUrl = await waitUntilReady(server, log);
    return { baseUrl, serverLog: () => log.join('').slice(-4000), stop };
  } catch (error) {
    await stop();
    throw error;
  }
}
