import * as fs from 'node:fs';
import * as path from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildServer, buildWeb } from './build.mjs';
import { endProcess, endRunningCommands, run, spawnLasting, within } from './child-processes.mjs';
import { chooseDataFolder, lockDataFolder, openDataFolder, readSecrets } from './data-folder.mjs';
import { ensureNpmPackages } from './npm-packages.mjs';
import { freePortFrom } from './ports.mjs';
import { Problem } from './problem.mjs';
import { openExistingServer, openOwnCluster } from './product-database.mjs';
import { createProgress } from './progress.mjs';
import { followServerLog, forTerminal, openServerLog } from './server-log.mjs';
import { ensureSystemPackages } from './system-packages.mjs';

/**
 * `npm start`: from a clean clone to a page in the browser, on a machine with nothing but Node. Plain Node without
 * packages, because there may be none yet. Everything it starts ends with it, in order; nothing else is touched.
 */

const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
const SERVER_GRACE_MS = 12_000;
const READY_WITHIN_MS = 120_000;

const envFile = path.join(ROOT, 'backend/.env');
if (fs.existsSync(envFile)) process.loadEnvFile(envFile);
const settings = process.env;

const progress = createProgress(8);
/** What runs, newest last; stopped from the end. */
const started = [];
let stopRequested = null;
let announceStop;
const stopAsked = new Promise((resolve) => {
  announceStop = resolve;
});

function isLoopback(host) {
  return host === 'localhost' || host === '::1' || /^127\./.test(host);
}

/** A wish to stop. A second one within two seconds is the same one: npm passes on what the terminal sent already. */
function requestStop(reason) {
  if (stopRequested !== null) {
    if (performance.now() - stopRequested > 2_000) for (const { hurry } of started) hurry?.();
    return;
  }
  stopRequested = performance.now();
  progress.write(`Stopping (${reason}) …`);
  endRunningCommands();
  announceStop(reason);
}

/** Thrown out of a step when somebody asked to stop in the middle of it. */
class Stopped extends Error {}

function unlessStopped() {
  if (stopRequested !== null) throw new Stopped();
}

async function step(title, work) {
  unlessStopped();
  try {
    await progress.step(title, work);
  } catch (error) {
    unlessStopped();
    throw error;
  }
  unlessStopped();
}

function watchForStop() {
  process.on('SIGINT', () => requestStop('interrupt'));
  process.on('SIGTERM', () => requestStop('asked to end'));
  process.on('SIGHUP', () => requestStop('terminal closed'));
  // npm killed outright tells nobody; its children then belong to another parent.
  const parent = process.ppid;
  setInterval(
    () => process.ppid !== parent && requestStop('the process that started this is gone'),
    1_000,
  ).unref();
}

/** Runs one of the built commands of the backend with the owner's address. */
async function runOwnerCommand(file, args, { database, folder, demo }, note) {
  const env = {
    ...settings,
    DATABASE_OWNER_URL: database.ownerUrl,
    DATABASE_APP_URL: database.appUrl,
    STAYLEDGER_DATA: folder,
    STAYLEDGER_DEMO: demo ? '1' : '0',
    NODE_ENV: 'production',
  };
  const { code, stdout, stderr } = await run([process.execPath, path.join(ROOT, file), ...args], {
    cwd: ROOT,
    env,
    onOutput: note,
  });
  if (code !== 0) throw new Problem(`${file} ${args.join(' ')} failed:`, (stderr + stdout).trim());
  return stdout.trim();
}

/** Starts API, web application and jobs in one process and waits until it says that it listens. */
async function startServer({ database, folder, secrets, demo, host, port, lock }) {
  const env = {
    ...settings,
    NODE_ENV: 'production',
    HOST: host,
    PORT: String(port),
    DATABASE_APP_URL: database.appUrl,
    STAYLEDGER_DATA: folder,
    SESSION_SECRET: settings.SESSION_SECRET || secrets.sessionSecret,
    STAYLEDGER_DEMO: demo ? '1' : '0',
  };
  // The server has no business with the owner's rights.
  delete env.DATABASE_OWNER_URL;
  delete env.DATABASE_URL;
  const logFile = path.join(folder, 'server.log');
  const log = openServerLog(logFile);
  const server = spawnLasting([process.execPath, path.join(ROOT, 'jobs/dist/all-in-one.js')], {
    cwd: ROOT,
    env,
    stdio: ['ignore', log.descriptor, log.descriptor],
    deathSignal: 'TERM',
  });
  fs.closeSync(log.descriptor);
  if (server.child.pid) lock.add(server.child.pid);
  let ready;
  const isReady = new Promise((resolve) => {
    ready = resolve;
  });
  const following = followServerLog(logFile, log.from, (line) => {
    const address = /^stayledger: ready on (\S+)/.exec(line);
    if (address) ready(address[1]);
    const shown = forTerminal(line);
    if (shown !== null) progress.write(shown);
  });
  // Its last lines come before our own about its end.
  void server.ended.then(() => following.flush());
  started.push({
    stop: async () => {
      await endProcess(server, 'SIGTERM', SERVER_GRACE_MS);
      following.stop();
    },
    hurry: () => server.child.kill('SIGKILL'),
  });
  const address = await within(
    READY_WITHIN_MS,
    Promise.race([isReady, server.ended.then(() => null), stopAsked.then(() => null)]),
  );
  unlessStopped();
  if (!address)
    throw new Problem(
      address === null
        ? 'The server ended while it started; its last lines say why.'
        : 'The server did not get ready in two minutes.',
    );
  return { server, address };
}

/** The demo's sign-ins, as the server offers them on its sign-in page. */
async function demoSignIns(address) {
  try {
    const reply = await fetch(`${address}/api/auth/demo-sign-ins`, { signal: AbortSignal.timeout(10_000) });
    return (await reply.json()).items;
  } catch (error) {
    // The page shows them too: no reason to stop a server that runs.
    progress.write(`The demo's sign-ins could not be read (${error.message}); the sign-in page shows them.`);
    return [];
  }
}

async function printWelcome({ address, folder, demo }) {
  const lines = ['', `Stayledger is ready:  ${settings.PUBLIC_URL || address}`];
  const signIns = demo ? await demoSignIns(address) : [];
  if (signIns.length > 0) {
    lines.push('', 'Demo sign-ins (this machine only):');
    const widest = Math.max(...signIns.map(({ role }) => role.length));
    for (const { role, email, password } of signIns)
      lines.push(`  ${role.padEnd(widest)}  ${email}  ${password}`);
  }
  lines.push('', `Its log: ${path.join(folder, 'server.log')}`, 'Ctrl-C stops it.', '');
  progress.write(lines.join('\n'));
}

async function main() {
  const ownCluster = !settings.DATABASE_URL;
  const host = settings.HOST || '127.0.0.1';
  const wantedPort = settings.PORT ? Number(settings.PORT) : 3000;
  if (!Number.isInteger(wantedPort) || wantedPort < 1 || wantedPort > 65535) {
    throw new Problem('PORT must be a whole number from 1 to 65535.');
  }

  await step('System packages', async (note) => {
    const installed = await ensureSystemPackages(ownCluster ? ['postgresql'] : [], note);
    return installed.length > 0 ? `installed ${installed.join(', ')}` : null;
  });
  await step('Packages from npm', (note) => ensureNpmPackages(ROOT, note));

  const { folder, reason } = await chooseDataFolder({
    root: ROOT,
    wanted: settings.STAYLEDGER_DATA,
    ownCluster,
  });
  openDataFolder(folder);
  progress.write(`Data folder: ${folder} (${reason})`);
  const lock = await lockDataFolder(folder, (text) => progress.write(`(${text})`));
  started.push({ stop: async () => lock.release() });
  const secrets = readSecrets(folder);

  // Its sign-ins are published on the screen, so the demo exists only where nobody else can reach it.
  const demo = ownCluster && isLoopback(host) && settings.STAYLEDGER_DEMO !== '0';

  let database;
  await step('Database', async () => {
    database = ownCluster
      ? await openOwnCluster({ folder, secrets })
      : await openExistingServer({
          databaseUrl: settings.DATABASE_URL,
          appUrl: settings.DATABASE_APP_URL,
          secrets,
        });
    started.push({ stop: database.stop });
    if (database.pid) lock.add(database.pid);
    return database.outcome;
  });
  await step('Build of the server', () => buildServer(ROOT));
  await step('Build of the web application', () => buildWeb(ROOT));
  const context = { database, folder, secrets, demo, host };
  await step('Database schema', (note) =>
    runOwnerCommand('backend/dist/database/migrate.cli.js', [], context, note),
  );
  await step('Reference data', async (note) => {
    const seed = 'backend/dist/database/seed.cli.js';
    const said = [await runOwnerCommand(seed, ['--reference'], context, note)];
    if (demo) said.push(await runOwnerCommand(seed, ['--demo'], context, note));
    return said
      .map((text) => text.split('\n').pop())
      .filter(Boolean)
      .join('; ');
  });

  let running;
  await step('Server', async () => {
    const port = await freePortFrom(wantedPort, host);
    running = await startServer({ ...context, port, lock });
    return port === wantedPort ? '' : `port ${wantedPort} is in use, took ${port}`;
  });
  await printWelcome({ address: running.address, folder, demo });

  const ending = await Promise.race([
    stopAsked,
    running.server.ended.then(
      ({ code, signal }) => new Problem(`The server ended by itself (${signal ?? `status ${code}`}).`),
    ),
    database.ended.then(() => new Problem('The database server ended by itself.')),
  ]);
  if (ending instanceof Problem) throw ending;
}

async function stopEverything() {
  for (const { stop } of started.splice(0).reverse()) await stop();
}

watchForStop();
let status = 0;
try {
  await main();
} catch (error) {
  if (error instanceof Problem) {
    console.error(`\n${error.message}`);
    status = 2;
  } else if (!(error instanceof Stopped)) {
    console.error(error);
    status = 1;
  }
}
await stopEverything();
if (stopRequested !== null) progress.write('Stopped.');
// Open pipes of ended children may linger for a moment; nothing is left to wait for.
process.exit(status);
