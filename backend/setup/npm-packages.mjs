import { createHash } from 'node:crypto';
import * as fs from 'node:fs';
import * as path from 'node:path';
import { run } from './child-processes.mjs';
import { Problem } from './problem.mjs';

/** Written last into node_modules. */
export const INSTALLED_STAMP = 'node_modules/.stayledger-installed';

/** What the installed packages depend on: the lock file, and the Node and platform that native parts are made for. */
export function installedFingerprint(root) {
  return createHash('sha256')
    .update(fs.readFileSync(path.join(root, 'package-lock.json')))
    .update(`${process.version} ${process.platform} ${process.arch}`)
    .digest('hex');
}

/**
 * `npm ci`, unless a stamp inside node_modules says that exactly this was installed already. The stamp is written
 * last, and npm removes the folder first: an interrupted install does itself again.
 * Resolves with `null` when there was nothing to do.
 */
export async function ensureNpmPackages(root, note = () => {}) {
  const stamp = path.join(root, INSTALLED_STAMP);
  const wanted = installedFingerprint(root);
  if (fs.existsSync(stamp) && fs.readFileSync(stamp, 'utf8') === wanted) return null;
  // The npm that started us, if any: PATH may hold another.
  const npm = process.env.npm_execpath ? [process.execPath, process.env.npm_execpath] : ['npm'];
  const { code, stdout, stderr } = await run(
    [...npm, 'ci', '--include=dev', '--ignore-scripts', '--no-audit', '--no-fund'],
    { cwd: root, onOutput: note },
  );
  if (code !== 0) {
    const tail = (stderr.trim() || stdout.trim()).split('\n').slice(-8);
    throw new Problem('npm could not install the packages:', ...tail.map((line) => `  ${line}`));
  }
  fs.writeFileSync(stamp, wanted);
  return 'installed';
}
