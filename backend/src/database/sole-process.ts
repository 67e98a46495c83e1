import { Client } from 'pg';

/** Any number, the same in every process of the service. */
const LOCK = 7_302_032;
const RETRY_MS = 2000;

/** Another process of the service works on this database in embedded mode. */
export class AnotherProcessError extends Error {
  override readonly name = 'AnotherProcessError';
}

export interface SoleProcess {
  release(): Promise<void>;
}

/**
 * Makes sure that only one process serves a database in embedded mode, where the queue lives in the process's memory:
 * an advisory lock on a connection of its own, which ends with the process however it ends. When the database goes
 * away the lock goes with it and is taken again.
 *
 * @param onLost called when another process took the lock while the database was away
 * @throws AnotherProcessError
 */
export async function becomeSoleProcess(url: string, onLost: () => void): Promise<SoleProcess> {
  let client = await connect(url);
  let released = false;
  if (!(await take(client))) {
    await client.end();
    throw new AnotherProcessError(
      'Another process of the service runs on this database. Stop it first, or set REDIS_URL to run several.',
    );
  }

  const holdOn = (): void => {
    client.once('end', () => {
      if (!released) setTimeout(() => void again(), RETRY_MS).unref();
    });
  };
  const again = async (): Promise<void> => {
    if (released) return;
    try {
      client = await connect(url);
      if (await take(client)) holdOn();
      else {
        await client.end();
        onLost();
      }
    } catch {
      setTimeout(() => void again(), RETRY_MS).unref();
    }
  };
  holdOn();
  return {
    async release() {
      released = true;
      await client.end();
    },
  };
}

async function connect(url: string): Promise<Client> {
  const client = new Client({
    connectionString: url,
    application_name: 'stayledger sole process',
    keepAlive: true,
    connectionTimeoutMillis: 5000,
  });
  // The end of the connection is what matters and comes as an event of its own.
  client.on('error', () => undefined);
  await client.connect();
  return client;
}

async function take(client: Client): Promise<boolean> {
  const { rows } = await client.query<{ taken: boolean }>('select pg_try_advisory_lock($1) as taken', [LOCK]);
  return rows[0].taken;
}
