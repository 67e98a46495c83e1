import { setTimeout as pause } from 'node:timers/promises';
import { Client } from 'pg';
import { databaseIsAway } from '../common/errors/database-away.js';

const WAIT_MS = 60_000;
const RETRY_MS = 500;

/**
 * Waits until the database takes connections, since it may be starting or recovering just when we start. Gives up after
 * a minute with what the database said last; anything but being away (a wrong password) is thrown at once.
 *
 * @param onWait told once when there is something to wait for
 */
export async function waitForDatabase(url: string, onWait: () => void, waitMs = WAIT_MS): Promise<void> {
  const deadline = performance.now() + waitMs;
  for (let told = false; ; told = true) {
    try {
      return await connectOnce(url);
    } catch (error) {
      if (!databaseIsAway(error) || performance.now() > deadline) throw error;
      if (!told) onWait();
      await pause(RETRY_MS);
    }
  }
}

async function connectOnce(url: string): Promise<void> {
  const client = new Client({ connectionString: url, connectionTimeoutMillis: 5000 });
  // An end that comes after the question was answered is not ours to deal with.
  client.on('error', () => undefined);
  try {
    await client.connect();
    await client.query('select 1');
  } finally {
    await client.end().catch(() => undefined);
  }
}
