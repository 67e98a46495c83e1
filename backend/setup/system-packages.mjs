import * as fs from 'node:fs';
import { userInfo } from 'node:os';
import { run } from './child-processes.mjs';
import { findPostgres } from './postgres-cluster.mjs';
import { Problem } from './problem.mjs';

/**
 * Programs that do not come with npm. They are installed with apt, only when they are missing and only by root;
 * anybody else is told the command.
 */

/** Chromium's program, or `null`. */
export function findChromium() {
  const places = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];
  return places.find((file) => fs.existsSync(file)) ?? null;
}

const NEEDS = {
  postgresql: { packages: ['postgresql'], present: async () => (await findPostgres()) !== null },
  chromium: { packages: ['chromium'], present: async () => findChromium() !== null },
  fonts: {
    // Without any font a browser draws empty boxes, and widths in screenshots mean nothing.
    packages: ['fonts-dejavu-core'],
    present: async () => fs.existsSync('/usr/share/fonts/truetype/dejavu/DejaVuSans.ttf'),
  },
  redis: {
    // redis-tools brings the server program too, without the service that the package redis-server would start.
    packages: ['redis-tools'],
    present: async () =>
      ['/usr/bin/redis-server', '/usr/bin/redis-check-rdb'].some((file) => fs.existsSync(file)),
  },
};

const CLUSTER_SETTINGS = '/etc/postgresql-common/createcluster.d/stayledger.conf';

/** Debian starts a cluster of its own on port 5432 when PostgreSQL is installed; we neither need nor want it. */
function declineDebianCluster() {
  if (fs.existsSync('/etc/postgresql-common') && fs.existsSync(CLUSTER_SETTINGS)) return;
  fs.mkdirSync('/etc/postgresql-common/createcluster.d', { recursive: true });
  fs.writeFileSync(
    CLUSTER_SETTINGS,
    '# Stayledger makes its own cluster; none is wanted from the package.\ncreate_main_cluster = false\n',
  );
}

/**
 * Installs what is missing of the named needs (`postgresql`, `chromium`, `fonts`, `redis`).
 * Resolves with the names of the packages it installed; throws a `Problem` when it may not or cannot.
 */
export async function ensureSystemPackages(names, note = () => {}) {
  const missing = [];
  for (const name of names) {
    if (!(await NEEDS[name].present())) missing.push(name);
  }
  if (missing.length === 0) return [];
  const packages = missing.flatMap((name) => NEEDS[name].packages);
  const command = `apt-get install --yes --no-install-recommends ${packages.join(' ')}`;
  if (!fs.existsSync('/usr/bin/apt-get')) {
    throw new Problem(
      `Missing on this machine: ${packages.join(', ')}. Install them with your system's package manager.`,
    );
  }
  if (userInfo().uid !== 0) {
    throw new Problem(
      `Missing on this machine: ${packages.join(', ')}. Run this once as root, then start again:`,
      `  ${command}`,
    );
  }
  if (missing.includes('postgresql')) declineDebianCluster();
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  // Another apt may be at work on a fresh machine (unattended upgrades): wait for it rather than fail.
  const apt = ['apt-get', '-o', 'DPkg::Lock::Timeout=300'];
  for (const args of [['update'], ['install', '--yes', '--no-install-recommends', ...packages]]) {
    const { code, stdout, stderr } = await run([...apt, ...args], { env, onOutput: note, uncuttable: true });
    if (code !== 0) {
      const tail = (stderr.trim() || stdout.trim()).split('\n').slice(-6);
      throw new Problem(`apt-get ${args[0]} failed:`, ...tail.map((line) => `  ${line}`));
    }
  }
  for (const name of missing) {
    if (!(await NEEDS[name].present()))
      throw new Problem(
        `${NEEDS[name].packages.join(', ')} was installed but its program is not where it should be.`,
      );
  }
  return packages;
}
