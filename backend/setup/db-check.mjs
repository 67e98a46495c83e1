import { spawnSync } from 'node:child_process';
import * as fs from 'node:fs';
import * as path from 'node:path';
import { fileURLToPath } from 'node:url';
import { programOf } from './build.mjs';
import { createThrowAwayCluster, makeTemporaryFolder } from './postgres-cluster.mjs';

/** `npm run db:check`: fails when the entities and the migrations disagree. Needs PostgreSQL, but no running one. */
const BACKEND = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..');

const folder = await makeTemporaryFolder('stayledger-db-check-');
const cluster = await createThrowAwayCluster(folder);
try {
  const [node, jest] = programOf(BACKEND, 'jest');
  const { status } = spawnSync(node, [jest, 'src/database/schema.int.spec.ts'], {
    cwd: BACKEND,
    stdio: 'inherit',
    env: { ...process.env, TEST_DATABASE_ADMIN_URL: cluster.adminUrl },
  });
  process.exitCode = status ?? 1;
} finally {
  await cluster.stop();
  fs.rmSync(folder, { recursive: true, force: true });
}
