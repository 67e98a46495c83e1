import * as fs from 'node:fs';
import * as os from 'node:os';
import * as path from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildServer, programOf } from './build.mjs';
import { spawnLasting } from './child-processes.mjs';
import { createThrowAwayCluster, makeTemporaryFolder } from './postgres-cluster.mjs';
import { Problem } from './problem.mjs';
import { ensureSystemPackages } from './system-packages.mjs';

/**
 * `npm run soak`: kills the built service 200 times at random moments (`-- --kills N` other than 200, `-- --seed TEXT`
 * other moments, `-- --only NAME` one of the specs of jobs/src/kills) and prints what was done. The same specs run
 * with a few kills in `npm test`.
 */

const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
/** How the kills are shared out: two of five on one process, two of five on several, one of five on migrations. */
const SHARES = [
  { spec: 'all-in-one', share: 0.4 },
  { spec: 'several-processes', share: 0.4 },
  { spec: 'migration', share: 0.2 },
  { spec: 'faults', share: 0 },
];

function option(name, fallback) {
  const at = process.argv.indexOf(`--${name}`);
  return at < 0 ? fallback : process.argv[at + 1];
}

async function main() {
  const kills = Number(option('kills', '200'));
  if (!Number.isInteger(kills) || kills < 1) throw new Problem('--kills takes a whole number from 1.');
  const seed = option('seed', '1');
  const only = option('only', undefined);
  const wanted = SHARES.filter(({ spec }) => only === undefined || spec === only);
  if (wanted.length === 0) {
    throw new Problem(`--only takes one of ${SHARES.map(({ spec }) => spec).join(', ')}.`);
  }
  await ensureSystemPackages(['postgresql', 'redis'], (text) => console.log(text));
  await buildServer(ROOT);
  const folder = await makeTemporaryFolder('stayledger-soak-');
  const report = path.join(
    fs.mkdtempSync(path.join(os.tmpdir(), 'stayledger-soak-report-')),
    'figures.jsonl',
  );
  const cluster = await createThrowAwayCluster(folder);
  let failures = 0;
  try {
    for (const { spec, share } of wanted) {
      const env = {
        ...process.env,
        NODE_ENV: 'test',
        TEST_DATABASE_ADMIN_URL: cluster.adminUrl,
        STAYLEDGER_KILLS: String(Math.max(1, Math.round(kills * (only === undefined ? share : 1)))),
        STAYLEDGER_KILL_SEED: seed,
        STAYLEDGER_KILL_REPORT: report,
      };
      const runner = spawnLasting(
        [...programOf(path.join(ROOT, 'jobs'), 'jest'), `src/kills/${spec}`, '--forceExit'],
        { cwd: path.join(ROOT, 'jobs'), env, stdio: ['ignore', 'inherit', 'inherit'], deathSignal: 'KILL' },
      );
      const { code } = await runner.ended;
      if (code !== 0) failures += 1;
    }
  } finally {
    await cluster.stop();
    fs.rmSync(folder, { recursive: true, force: true });
  }
  for (const line of fs.existsSync(report) ? fs.readFileSync(report, 'utf8').trim().split('\n') : []) {
    const { name, figures } = JSON.parse(line);
    console.log(`${name}: ${JSON.stringify(figures)}`);
  }
  fs.rmSync(path.dirname(report), { recursive: true, force: true });
  console.log(failures === 0 ? 'soak: all in order' : `soak: ${failures} of ${wanted.length} not in order`);
  return failures === 0 ? 0 : 1;
}

try {
  process.exitCode = await main();
} catch (error) {
  console.error(error instanceof Problem ? error.message : error);
  process.exitCode = 2;
}
