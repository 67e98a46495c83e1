import { type ChildProcess, spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Redis } from 'ioredis';

/** A real Redis server that lives as long as a test file. */
export interface TestRedisServer {
  readonly url: string;
  readonly process: ChildProcess;
  /** Forgets everything, as a server without a disk does when it is started anew. */
  flushAll(): Promise<void>;
  stop(): Promise<void>;
}

// Debian's redis-tools ships the whole server program under the name of its checker; it looks at the name it was
// called by. So tests need no package that would start a service on the machine.
const PROGRAMS = ['/usr/bin/redis-server', '/usr/local/bin/redis-server', '/usr/bin/redis-check-rdb'];

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() =>
        typeof address === 'object' && address ? resolve(address.port) : reject(new Error('no port')),
      );
    });
  });
}

/**
 * Starts a Redis server on loopback, in memory only, in a folder of its own.
 *
 * @param wantedPort where an earlier one was, to take its place; else a free one
 */
export async function startRedisServer(wantedPort?: number): Promise<TestRedisServer> {
  const program = PROGRAMS.find(existsSync);
  if (!program) throw new Error('These tests need a Redis server: install the package redis-tools.');
  const folder = await mkdtemp(join(tmpdir(), 'stayledger-redis-'));
  const port = wantedPort ?? (await freePort());
  const settings = [
    '--port',
    String(port),
    '--bind',
    '127.0.0.1',
    '--dir',
    folder,
    '--save',
    '',
    '--appendonly',
    'no',
  ];
  // The kernel ends the server should the test process be killed: no server may be left behind.
  const child = spawn(
    'setpriv',
    ['--pdeathsig', 'KILL', 'bash', '-c', 'exec -a redis-server "$0" "$@"', program, ...settings],
    {
      stdio: ['ignore', 'pipe', 'pipe'],
    },
  );
  let said = '';
  const ended = new Promise<void>((resolve) => {
    child.once('close', () => resolve());
  });
  await new Promise<void>((resolve, reject) => {
    const listen = (chunk: Buffer) => {
      said += chunk.toString();
      if (said.includes('Ready to accept connections')) resolve();
    };
    child.stdout.on('data', listen);
    child.stderr.on('data', listen);
    child.once('error', reject);
    child.once('exit', () => reject(new Error(`The Redis server ended at once:\n${said}`)));
  });
  return {
    url: `redis://127.0.0.1:${port}`,
    process: child,
    async flushAll() {
      const client = new Redis(port, '127.0.0.1');
      await client.flushall();
      client.disconnect();
    },
    async stop() {
      child.kill('SIGKILL');
      await ended;
      await rm(folder, { recursive: true, force: true });
    },
  };
}
