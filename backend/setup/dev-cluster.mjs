import * as fs from 'node:fs';
import * as os from 'node:os';
import * as path from 'node:path';
import { createThrowAwayCluster, makeTemporaryFolder, withConnection } from './postgres-cluster.mjs';
import { Problem } from './problem.mjs';

/**
 * `node backend/setup/dev-cluster.mjs`: starts (or finds running) a throw-away PostgreSQL for single test files,
 * so that `npx jest some.int.spec.ts` works without the whole of `npm test`. Its address is printed and kept in
 * <tmp>/stayledger-dev-cluster.json, where the Jest set-up looks. `--stop` ends it and removes its files.
 */
const NOTE = path.join(os.tmpdir(), 'stayledger-dev-cluster.json');

function readNote() {
  try {
    return JSON.parse(fs.readFileSync(NOTE, 'utf8'));
  } catch (error) {
    if (error.code === 'ENOENT') return null;
    throw new Problem(`${NOTE} cannot be read (${error.message}). Does it belong to another user?`);
  }
}

async function answers(note) {
  try {
    await withConnection(note.adminUrl, (client) => client.query('select 1'));
    return true;
  } catch {
    return false;
  }
}

function forget(note) {
  if (note?.folder) fs.rmSync(note.folder, { recursive: true, force: true });
  fs.rmSync(NOTE, { force: true });
}

async function main() {
  const note = readNote();
  const running = note !== null && (await answers(note));
  if (process.argv.includes('--stop')) {
    // Only a server that answers with our password is ours; a bare process number could be anybody's by now.
    if (running) process.kill(note.pid, 'SIGINT');
    for (
      let waited = 0;
      running && waited < 20_000 && fs.existsSync(path.join(note.folder, 'postgres/postmaster.pid'));
      waited += 100
    ) {
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
    forget(note);
    return 'stopped';
  }
  if (running) return note.adminUrl;
  forget(note);
  const folder = await makeTemporaryFolder('stayledger-dev-');
  const { adminUrl, pid } = await createThrowAwayCluster(folder, { outlive: true });
  const draft = path.join(folder, 'note.json');
  fs.writeFileSync(draft, JSON.stringify({ adminUrl, folder, pid }, null, 2), { mode: 0o600 });
  fs.renameSync(draft, NOTE);
  return adminUrl;
}

try {
  console.log(`TEST_DATABASE_ADMIN_URL=${await main()}`);
} catch (error) {
  console.error(error instanceof Problem ? error.message : error);
  process.exitCode = 2;
}
