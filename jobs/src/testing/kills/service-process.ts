import { type ChildProcess, spawn } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { join } from 'node:path';

/** The programs as they are built and started in earnest; a test of kills is worth nothing on anything else. */
const PROGRAMS = {
  'all-in-one': { file: 'jobs/dist/all-in-one.js', ready: 'stayledger: ready on ' },
  api: { file: 'backend/dist/main.js', ready: 'ready on http' },
  worker: { file: 'jobs/dist/main.js', ready: 'ready, counting in' },
  migrate: { file: 'backend/dist/database/migrate.cli.js', ready: '\n' },
  seed: { file: 'backend/dist/database/seed.cli.js', ready: '\n' },
} as const;
export type ProgramName = keyof typeof PROGRAMS;

const ROOT = join(__dirname, '../../../..');
const READY_WITHIN_MS = 90_000;
const SIGTERM_BIT = 1n << 14n;

export interface Ended {
  code: number | null;
  signal: NodeJS.Signals | null;
}

/** One process of the product, started from the build, to be ended in any way. */
export class ServiceProcess {
  private said = '';
  private unfinished = '';
  /** The errors it logged; a service that is only killed and cut off has none to tell of. */
  readonly errors: string[] = [];
  readonly ended: Promise<Ended>;
  /** Resolves with true once it says it is ready, with false when it ended before. */
  readonly ready: Promise<boolean>;

  private constructor(
    readonly name: ProgramName,
    private readonly child: ChildProcess,
  ) {
    this.ended = new Promise((resolve) => {
      child.once('close', (code, signal) => resolve({ code, signal }));
    });
    const { ready } = PROGRAMS[name];
    this.ready = new Promise((resolve) => {
      const listen = (chunk: Buffer) => {
        // The last words are enough to say what went wrong.
        this.said = (this.said + chunk.toString()).slice(-20_000);
        if (this.said.includes(ready)) resolve(true);
        const lines = (this.unfinished + chunk.toString()).split('\n');
        this.unfinished = lines.pop() ?? '';
        for (const line of lines) if (line.includes('"level":"error"')) this.errors.push(line.slice(0, 2000));
      };
      child.stdout?.on('data', listen);
      child.stderr?.on('data', listen);
      child.once('close', () => resolve(false));
    });
  }

  static start(
    name: ProgramName,
    env: Record<string, string>,
    options: { args?: string[]; execArgv?: string[]; ipc?: boolean } = {},
  ): ServiceProcess {
    const { args = [], execArgv = [], ipc = false } = options;
    const child = spawn(
      'setpriv',
      // The kernel ends it should the test be killed: no process may be left behind.
      ['--pdeathsig', 'KILL', process.execPath, ...execArgv, join(ROOT, PROGRAMS[name].file), ...args],
      {
        cwd: ROOT,
        env: { PATH: process.env.PATH, TZ: 'Pacific/Chatham', NODE_ENV: 'production', ...env },
        stdio: ['ignore', 'pipe', 'pipe', ...(ipc ? (['ipc'] as const) : [])],
      },
    );
    return new ServiceProcess(name, child);
  }

  get pid(): number {
    if (this.child.pid === undefined) throw new Error(`${this.name} did not start`);
    return this.child.pid;
  }

  get running(): boolean {
    return this.child.exitCode === null && this.child.signalCode === null;
  }

  get lastWords(): string {
    return this.said.slice(-3000);
  }

  /** What it says by then is in the message when it does not get ready. */
  async untilReady(): Promise<this> {
    const late = new Promise<'late'>((resolve) => setTimeout(() => resolve('late'), READY_WITHIN_MS).unref());
    if ((await Promise.race([this.ready, late])) !== true) {
      throw new Error(`${this.name} did not get ready: ${this.lastWords}`);
    }
    return this;
  }

  /** Waits until a SIGTERM reaches our own handler, which is long before the process is ready. */
  async untilItListensToSignals(): Promise<void> {
    while (this.running) {
      const caught = /^SigCgt:\s*([0-9a-f]+)/m.exec(readFileSync(`/proc/${this.pid}/status`, 'utf8'));
      if (caught && (BigInt(`0x${caught[1]}`) & SIGTERM_BIT) !== 0n) return;
      await pause(5);
    }
  }

  send(message: object): Promise<unknown> {
    const answer = new Promise<unknown>((resolve) => this.child.once('message', resolve));
    this.child.send(message);
    return answer;
  }

  async kill(): Promise<void> {
    this.child.kill('SIGKILL');
    await this.ended;
  }

  /** Asks it to end; resolves with how it ended and how long it took. */
  async stop(): Promise<Ended & { tookMs: number }> {
    const from = performance.now();
    this.child.kill('SIGTERM');
    return { ...(await this.ended), tookMs: performance.now() - from };
  }
}

export function pause(ms: number): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, ms));
}

/** A port nobody listens on at this moment: a service that is killed comes back at the same address. */
export function anyFreePort(): Promise<number> {
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
