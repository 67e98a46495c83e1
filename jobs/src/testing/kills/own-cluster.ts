import { type ChildProcessWithoutNullStreams, spawn } from 'node:child_process';
import { join } from 'node:path';
import { createInterface, type Interface } from 'node:readline';

const PROGRAM = join(__dirname, '../../../../backend/setup/test-cluster.mjs');

/** A PostgreSQL server of one test file, which may be hurt: nobody else's tests run on it. */
export class OwnCluster {
  private constructor(
    private readonly child: ChildProcessWithoutNullStreams,
    private readonly lines: AsyncIterator<string>,
    private readonly reader: Interface,
    /** As the superuser. */
    readonly adminUrl: string,
  ) {}

  /** Starts one, and makes it the server that `createTestDatabase()` of this process uses. */
  static async start(): Promise<OwnCluster> {
    const child = spawn(process.execPath, [PROGRAM], { stdio: ['pipe', 'pipe', 'pipe'] });
    let said = '';
    child.stderr.on('data', (chunk: Buffer) => {
      said += chunk.toString();
    });
    const reader = createInterface({ input: child.stdout });
    const lines = reader[Symbol.asyncIterator]();
    const first = await lines.next();
    if (first.done) throw new Error(`the cluster did not start: ${said}`);
    const { adminUrl } = JSON.parse(first.value) as { adminUrl: string };
    process.env.TEST_DATABASE_ADMIN_URL = adminUrl;
    return new OwnCluster(child, lines, reader, adminUrl);
  }

  /** Ends the server as an administrator would, for a while. */
  stop(): Promise<void> {
    return this.say('stop');
  }

  /** Begins it again, on the same port. */
  resume(): Promise<void> {
    return this.say('start');
  }

  /** Ends the server for good and removes its files. */
  async end(): Promise<void> {
    const ended = new Promise<void>((resolve) => this.child.once('close', () => resolve()));
    this.child.stdin.end();
    this.reader.resume();
    await ended;
  }

  private async say(word: string): Promise<void> {
    this.child.stdin.write(`${word}\n`);
    const { done } = await this.lines.next();
    if (done) throw new Error(`the cluster ended when told to ${word}`);
  }
}
