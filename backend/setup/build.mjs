import { createHash } from 'node:crypto';
import * as fs from 'node:fs';
import { createRequire } from 'node:module';
import * as path from 'node:path';
import { run } from './child-processes.mjs';
import { Problem } from './problem.mjs';

/**
 * Builds, skipped when the sources are byte for byte those of the last build. The stamp lies in the built folder, so
 * a deleted or half-made folder is built again.
 */

/** Written last into a built folder. */
export const BUILT_STAMP = '.stayledger-built';
export const SERVER_WORKSPACES = ['shared', 'backend', 'jobs'];
export const WEB_SOURCES = ['shared', 'reference-data', 'frontend'];
// Folders at the top of a workspace that no build reads.
const NOT_SOURCES = new Set(['node_modules', 'dist', 'coverage', 'e2e', 'setup', 'bench']);

function filesBelow(folder, except = new Set()) {
  if (!fs.existsSync(folder)) return [];
  return fs
    .readdirSync(folder, { withFileTypes: true })
    .sort((a, b) => (a.name < b.name ? -1 : 1))
    .flatMap((entry) => {
      const full = path.join(folder, entry.name);
      if (entry.isDirectory()) return except.has(entry.name) ? [] : filesBelow(full);
      return entry.isFile() ? [full] : [];
    });
}

/** A hash of everything the build of these workspaces reads. */
export function sourceFingerprint(root, workspaces) {
  const hash = createHash('sha256').update(process.version);
  const files = [
    ...['package-lock.json', 'tsconfig.json'].map((name) => path.join(root, name)),
    ...workspaces.flatMap((name) => filesBelow(path.join(root, name), NOT_SOURCES)),
  ];
  for (const file of files) {
    hash.update(`\0${path.relative(root, file)}\0`).update(fs.readFileSync(file));
  }
  return hash.digest('hex');
}

function isFresh(dists, wanted) {
  return dists.every((dist) => {
    const stamp = path.join(dist, BUILT_STAMP);
    return fs.existsSync(stamp) && fs.readFileSync(stamp, 'utf8') === wanted;
  });
}

function writeStamps(dists, wanted) {
  for (const dist of dists) fs.writeFileSync(path.join(dist, BUILT_STAMP), wanted);
}

/**
 * Removes built files whose source is gone. The compiler leaves them, and a migration that was renamed would
 * otherwise run under both names.
 */
export function removeOrphans(workspace) {
  const dist = path.join(workspace, 'dist');
  const removed = [];
  for (const file of filesBelow(dist)) {
    const match = /^(.*?)(\.d\.ts|\.js)(\.map)?$/.exec(path.relative(dist, file));
    if (!match) continue;
    const source = path.join(workspace, 'src', match[1]);
    if (['.ts', '.tsx', '.js'].some((ending) => fs.existsSync(source + ending))) continue;
    fs.rmSync(file);
    removed.push(file);
  }
  return removed;
}

/** A package's program as a command for this Node, found the way Node finds packages from `workspace`. */
export function programOf(workspace, packageName, binName = packageName) {
  const require = createRequire(path.join(workspace, 'package.json'));
  // Some packages do not export their package.json: look for it along the search path instead of requiring it.
  for (const folder of require.resolve.paths(packageName)) {
    const manifest = path.join(folder, packageName, 'package.json');
    if (!fs.existsSync(manifest)) continue;
    const { bin } = JSON.parse(fs.readFileSync(manifest, 'utf8'));
    const file = typeof bin === 'string' ? bin : bin?.[binName];
    if (file) return [process.execPath, path.join(folder, packageName, file)];
  }
  throw new Problem(`The package ${packageName} is not installed; delete node_modules and start again.`);
}

/** Compiles shared, backend and jobs. Resolves with `null` when nothing changed. */
export async function buildServer(root) {
  const dists = SERVER_WORKSPACES.map((name) => path.join(root, name, 'dist'));
  const wanted = sourceFingerprint(root, SERVER_WORKSPACES);
  if (isFresh(dists, wanted)) return null;
  const { code, stdout, stderr } = await run([...programOf(root, 'typescript', 'tsc'), '-b'], { cwd: root });
  if (code !== 0) throw new Problem('The server could not be built:', (stdout + stderr).trim());
  for (const name of SERVER_WORKSPACES) removeOrphans(path.join(root, name));
  writeStamps(dists, wanted);
  return 'built';
}

/** Builds the web application. Resolves with `null` when nothing changed. */
export async function buildWeb(root) {
  const frontend = path.join(root, 'frontend');
  const dists = [path.join(frontend, 'dist')];
  const wanted = sourceFingerprint(root, WEB_SOURCES);
  if (isFresh(dists, wanted)) return null;
  const { code, stdout, stderr } = await run(
    [...programOf(frontend, 'vite'), 'build', '--logLevel', 'warn'],
    {
      cwd: frontend,
      env: { ...process.env, NODE_ENV: 'production' },
    },
  );
  if (code !== 0) throw new Problem('The web application could not be built:', (stderr || stdout).trim());
  writeStamps(dists, wanted);
  return 'built';
}
