import * as fs from 'node:fs';
import * as os from 'node:os';
import * as path from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildServer, buildWeb, programOf } from './build.mjs';
import { endRunningCommands, spawnLasting } from './child-processes.mjs';
import { ensureNpmPackages } from './npm-packages.mjs';
import { createThrowAwayCluster, makeTemporaryFolder } from './postgres-cluster.mjs';
import { Problem } from './problem.mjs';
import { ensureSystemPackages, findChromium } from './system-packages.mjs';
import { countCheck, countLine, countRunner, sumCounts } from './test-counts.mjs';

/**
 * `npm test`: everything, from a clean clone. `npm test -- --only backend` (or `--only lint,jobs`) runs some stages.
 * The last line counts the tests of all runners; the exit status says the same.
 */

const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
const at = (...parts) => path.join(ROOT, ...parts);

const vitest = (cwd, ...args) => ({
  cwd,
  command: (report) => [
    ...programOf(ROOT, 'vitest'),
    'run',
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${report}`,
    ...args,
  ],
});
const jest = (cwd) => ({
  cwd,
  command: (report) => [...programOf(cwd, 'jest'), '--json', `--outputFile=${report}`],
});

/** In the order they run: what fails fast and often comes first. */
const STAGES = [
  { name: 'types', run: checkTypes },
  { name: 'lint', run: checkLint },
  {
    name: 'setup',
    runner: vitest(at(), '--config', 'backend/setup/vitest.config.mjs'),
    needs: ['postgresql'],
  },
  { name: 'shared', runner: vitest(at('shared')) },
  { name: 'reference-data', runner: vitest(at('reference-data')) },
  { name: 'backend', runner: jest(at('backend')), needs: ['postgresql', 'redis'] },
  { name: 'jobs', runner: jest(at('jobs')), needs: ['postgresql', 'redis'] },
  { name: 'frontend', runner: vitest(at('frontend')) },
  { name: 'browser', run: runBrowser, needs: ['postgresql', 'chromium', 'fonts', 'redis'] },
];

function chosenStages() {
  const wanted = process.argv
    .slice(2)
    .flatMap((word, index, words) => (words[index - 1] === '--only' ? word.split(',') : []));
  const unknown = wanted.filter((name) => !STAGES.some((stage) => stage.name === name));
  if (unknown.length > 0 || process.argv.slice(2).some((word) => word.startsWith('-') && word !== '--only')) {
    throw new Problem(
      `Usage: npm test [-- --only STAGE[,STAGE…]]; stages: ${STAGES.map(({ name }) => name).join(', ')}.`,
    );
  }
  return wanted.length === 0 ? STAGES : STAGES.filter(({ name }) => wanted.includes(name));
}

const reports = fs.mkdtempSync(path.join(os.tmpdir(), 'stayledger-reports-'));
const results = [];
let cluster = null;
let clusterFolder = null;
let runningStage = null;
let stopping = false;

/** The surroundings of every runner: nothing of the person's own settings, one odd zone for all. */
function testEnvironment() {
  const env = { ...process.env, TZ: 'Pacific/Chatham', NODE_ENV: 'test' };
  for (const name of Object.keys(env)) {
    if (
      /^(DATABASE_|STAYLEDGER_|TEST_)|^(HOST|PORT|PUBLIC_URL|TRUST_PROXY|REDIS_URL|SMTP_URL|SESSION_SECRET|COUNTING_THREADS|LOG_LEVEL)$/.test(
        name,
      )
    ) {
      delete env[name];
    }
  }
  const chromium = findChromium();
  if (chromium) env.STAYLEDGER_CHROMIUM = chromium;
  if (cluster) {
    const url = new URL(cluster.adminUrl);
    env.TEST_DATABASE_ADMIN_URL = cluster.adminUrl;
    env.TEST_PG_HOST = url.hostname;
    env.TEST_PG_PORT = url.port;
    env.TEST_PG_USER = url.username;
    env.TEST_PG_PASSWORD = decodeURIComponent(url.password);
  }
  return env;
}

/** Runs a command with its output on the screen; resolves with its exit status. */
async function show(command, cwd) {
  // A group of its own, so that a stop reaches the workers of a runner too.
  const program = spawnLasting(command, {
    cwd,
    env: testEnvironment(),
    stdio: ['ignore', 'inherit', 'inherit'],
    deathSignal: 'KILL',
  });
  runningStage = program;
  const { code, signal } = await program.ended;
  // What a killed runner left in its group (a browser, a server) ends with it.
  signalStage('SIGKILL');
  runningStage = null;
  return code ?? (signal ? 1 : 0);
}

function signalStage(signal) {
  if (!runningStage?.child.pid) return;
  try {
    process.kill(-runningStage.child.pid, signal);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}

async function checkTypes() {
  const server = await show([...programOf(ROOT, 'typescript', 'tsc'), '-b'], ROOT);
  // Also notes that this build is fresh, and clears away what lost its source.
  if (server === 0) await buildServer(ROOT);
  const web = await show(
    [...programOf(at('frontend'), 'typescript', 'tsc'), '-p', 'tsconfig.json', '--noEmit'],
    at('frontend'),
  );
  return sumCounts([
    countCheck({ name: 'type check of the server', exitCode: server }),
    countCheck({ name: 'type check of the web application', exitCode: web }),
  ]);
}

async function checkLint() {
  const lint = await show([...programOf(ROOT, 'eslint'), '.', '--max-warnings', '0'], ROOT);
  const format = await show([...programOf(ROOT, 'prettier'), '--check', '--log-level', 'warn', '.'], ROOT);
  return sumCounts([
    countCheck({ name: 'lint', exitCode: lint }),
    countCheck({ name: 'format', exitCode: format }),
  ]);
}

async function runRunner(name, { cwd, command }) {
  const reportFile = path.join(reports, `${name}.json`);
  const exitCode = await show(command(reportFile), cwd);
  return countRunner({ name, reportFile, exitCode });
}

async function runBrowser() {
  await buildServer(ROOT);
  await buildWeb(ROOT);
  return runRunner('browser', vitest(at('frontend'), '--config', 'vitest.e2e.config.ts'));
}

async function runStage({ name, run, runner }) {
  console.log(`\n=== ${name}`);
  const begun = performance.now();
  let counts;
  try {
    counts = run ? await run() : await runRunner(name, runner);
  } catch (error) {
    // A stage that cannot even begin must not take the count line away.
    console.error(error instanceof Problem ? error.message : error);
    counts = { passed: 0, failed: 1, skipped: 0, failures: [`${name}: could not be run`] };
  }
  results.push({ name, counts, seconds: (performance.now() - begun) / 1000 });
}

async function prepare(stages) {
  const begun = performance.now();
  const needs = new Set(stages.flatMap(({ needs: wanted = [] }) => wanted));
  const installed = await ensureSystemPackages([...needs]);
  if (installed.length > 0) console.log(`Installed ${installed.join(', ')}.`);
  if (stopping) return;
  if ((await ensureNpmPackages(ROOT)) !== null) console.log('Installed the packages from npm.');
  if (stopping) return;
  // Worker threads and child processes run what was built, not the sources.
  if (
    !stages.some(({ name }) => name === 'types') &&
    stages.some(({ runner, run }) => runner || run === runBrowser)
  ) {
    await buildServer(ROOT);
  }
  if (needs.has('postgresql')) {
    clusterFolder = await makeTemporaryFolder('stayledger-test-');
    cluster = await createThrowAwayCluster(clusterFolder);
  }
  results.push({ name: 'preparation', counts: sumCounts([]), seconds: (performance.now() - begun) / 1000 });
}

async function cleanUp() {
  await cluster?.stop();
  if (clusterFolder) fs.rmSync(clusterFolder, { recursive: true, force: true });
  fs.rmSync(reports, { recursive: true, force: true });
}

function requestStop() {
  if (stopping) return;
  stopping = true;
  endRunningCommands();
  signalStage('SIGTERM');
  setTimeout(() => signalStage('SIGKILL'), 5_000).unref();
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, requestStop);
const parent = process.ppid;
setInterval(() => process.ppid !== parent && requestStop(), 1_000).unref();

let broken = 0;
try {
  const stages = chosenStages();
  await prepare(stages);
  for (const stage of stages) {
    if (stopping) break;
    await runStage(stage);
  }
} catch (error) {
  console.error(error instanceof Problem ? error.message : error);
  broken = 1;
}
await cleanUp();

const total = sumCounts(results.map(({ counts }) => counts));
console.log('\nStage times');
for (const { name, counts, seconds } of results) {
  console.log(`  ${name.padEnd(16)}${seconds.toFixed(1).padStart(7)} s   ${countLine(counts)}`);
}
if (total.failures.length > 0)
  console.log(['', 'Failures', ...total.failures.map((text) => `  ${text}`)].join('\n'));
if (stopping) console.log('\nStopped before the end.');
console.log(`\n${countLine({ ...total, failed: total.failed + broken + (stopping ? 1 : 0) })}`);
process.exit(total.failed + broken > 0 || stopping ? 1 : 0);
