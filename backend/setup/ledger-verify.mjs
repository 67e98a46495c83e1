import { spawnSync } from 'node:child_process';
import * as fs from 'node:fs';
import * as path from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildServer } from './build.mjs';
import { chooseDataFolder, lockDataFolder, openDataFolder, readSecrets } from './data-folder.mjs';
import { DATABASE, OWNER_ROLE, databaseUrl, livePostmaster } from './postgres-cluster.mjs';
import { Problem } from './problem.mjs';
import { openOwnCluster } from './product-database.mjs';

/**
 * `npm run -s ledger:verify`: checks the ledgers of this installation: every hash and, from the stored spectra, every
 * amount. Works beside a running service, and by itself when none runs. Ends with 0 when everything holds, 1 when
 * something differs (each difference is a line), 2 when it could not be checked.
 */

const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
const COMMAND = path.join(ROOT, 'backend/dist/ledger/ledger-verify.cli.js');

/** Runs the built command against a database. */
function check(ownerUrl) {
  const { status, error } = spawnSync(process.execPath, [COMMAND], {
    cwd: ROOT,
    stdio: 'inherit',
    env: { ...process.env, DATABASE_OWNER_URL: ownerUrl },
  });
  if (error) throw new Problem(`The check could not be started: ${error.message}`);
  return status ?? 2;
}

/** The cluster of a service that runs now, or `null`. */
function runningCluster(folder) {
  if (!livePostmaster(path.join(folder, 'postgres'))) return null;
  const port = Number(fs.readFileSync(path.join(folder, 'postgres.port'), 'utf8'));
  return databaseUrl({
    role: OWNER_ROLE,
    password: readSecrets(folder).ownerPassword,
    port,
    database: DATABASE,
  });
}

async function main() {
  const envFile = path.join(ROOT, 'backend/.env');
  if (fs.existsSync(envFile)) process.loadEnvFile(envFile);
  const given = process.env.DATABASE_OWNER_URL || process.env.DATABASE_URL;
  if (given) {
    await buildServer(ROOT);
    return check(given);
  }
  const { folder } = await chooseDataFolder({
    root: ROOT,
    wanted: process.env.STAYLEDGER_DATA,
    ownCluster: true,
  });
  if (!fs.existsSync(path.join(folder, 'postgres'))) {
    throw new Problem(`There is no database in ${folder} yet: npm start makes one.`);
  }
  const running = runningCluster(folder);
  if (running !== null) {
    // A running service loads parts of its build late, so it is not built anew under it.
    if (!fs.existsSync(COMMAND)) throw new Problem('The running service is older than this command.');
    return check(running);
  }
  openDataFolder(folder);
  const lock = await lockDataFolder(folder);
  try {
    await buildServer(ROOT);
    const database = await openOwnCluster({ folder, secrets: readSecrets(folder) });
    try {
      lock.add(database.pid);
      return check(database.ownerUrl);
    } finally {
      await database.stop();
    }
  } finally {
    lock.release();
  }
}

try {
  process.exitCode = await main();
} catch (error) {
  console.error(error instanceof Problem ? error.message : error);
  process.exitCode = 2;
}
