import { spawnSync } from 'node:child_process';
import * as fs from 'node:fs';
import * as path from 'node:path';
import { fileURLToPath } from 'node:url';

/**
 * `npm run analyse`: starts the command from the build when that is as new as the sources, else straight from the
 * sources. It needs no more than `npm ci`.
 */

const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');

/** What the command is made of. */
const PARTS = [
  ['shared', 'fatigue'],
  ['shared', 'units'],
  ['jobs', 'analyse'],
  ['jobs', 'analyse.cli.ts'],
];

function isBuilt(workspace, part) {
  const source = path.join(ROOT, workspace, 'src', part);
  const files = fs.statSync(source).isDirectory()
    ? fs.readdirSync(source, { recursive: true }).map((name) => path.join(part, name))
    : [part];
  return files
    .filter((name) => name.endsWith('.ts') && !name.endsWith('.spec.ts'))
    .every((name) => {
      const built = path.join(ROOT, workspace, 'dist', name.replace(/\.ts$/, '.js'));
      const written = fs.statSync(built, { throwIfNoEntry: false })?.mtimeMs ?? 0;
      return written >= fs.statSync(path.join(ROOT, workspace, 'src', name)).mtimeMs;
    });
}

const start = PARTS.every(([workspace, part]) => isBuilt(workspace, part))
  ? [path.join(ROOT, 'jobs/dist/analyse.cli.js')]
  : [
      '--import',
      import.meta.resolve('tsx'),
      '--conditions=@stayledger/source',
      path.join(ROOT, 'jobs/src/analyse.cli.ts'),
    ];
const { status, error } = spawnSync(process.execPath, [...start, ...process.argv.slice(2)], {
  // npm changes into the root; paths are meant from where the command was given.
  cwd: process.env.INIT_CWD ?? process.cwd(),
  env: { ...process.env, TSX_TSCONFIG_PATH: path.join(ROOT, 'tsconfig.json') },
  stdio: 'inherit',
});
if (error) process.stderr.write(`analyse: ${error.message}\n`);
process.exitCode = status ?? 2;
