import * as fs from 'node:fs';
import * as path from 'node:path';
import { createInterface } from 'node:readline';
import { pause, run } from './child-processes.mjs';
import { anyFreePort } from './ports.mjs';
import {
  ADMIN_ROLE,
  createCluster,
  databaseUrl,
  findPostgres,
  makeTemporaryFolder,
  newPassword,
  serverAccount,
  startCluster,
} from './postgres-cluster.mjs';

/**
 * A durable PostgreSQL of its own for tests that hurt it, for as long as standard input stays open. Unlike the common
 * throw-away server, what it has committed survives the death of its processes. Prints one line of JSON with its
 * address; `stop` and `start` on standard input end and begin it on the same port, each answered by a line.
 */

const postgres = await findPostgres();
if (!postgres) throw new Error('PostgreSQL is not installed (package postgresql).');
const account = serverAccount();
const adminPassword = newPassword();
const folder = await makeTemporaryFolder('stayledger-own-cluster-');
if (account) await run(['chown', `${account}:`, folder]);
const directory = path.join(folder, 'postgres');
await createCluster({ postgres, directory, adminPassword, account, durable: false });
const port = await anyFreePort();

let server = null;
async function start() {
  server = await startCluster({ postgres, directory, account, port, logFile: path.join(folder, 'log') });
}
async function stop() {
  await server?.stop();
  server = null;
}

await start();
const adminUrl = databaseUrl({ role: ADMIN_ROLE, password: adminPassword, port, database: 'postgres' });
console.log(JSON.stringify({ adminUrl, pid: server.pid }));

for await (const line of createInterface({ input: process.stdin })) {
  if (line === 'stop') await stop();
  else if (line === 'start') await start();
  console.log(line);
}
await stop();
// The last server process may still be closing a file.
for (let tries = 0; tries < 20; tries += 1) {
  try {
    fs.rmSync(folder, { recursive: true, force: true });
    break;
  } catch {
    await pause(100);
  }
}
