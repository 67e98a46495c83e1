import { spawnSync } from 'node:child_process';
import * as path from 'node:path';
import { fileURLToPath } from 'node:url';

/**
 * `npm run bench`: builds the server, which the rows about whole processes start from, and runs the
 * measurements from their sources.
 */

const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');

function run(args, stdout) {
  const { status, error } = spawnSync(process.execPath, args, {
    cwd: ROOT,
    stdio: ['ignore', stdout, 'inherit'],
  });
  if (error) process.stderr.write(`bench: ${error.message}\n`);
  return status ?? 1;
}

// Standard output belongs to the measurements; what the compiler says goes to standard error.
const built = run([path.join(ROOT, 'node_modules/typescript/bin/tsc'), '-b'], 2);
process.exitCode =
  built !== 0
    ? built
    : run(
        [
          '--import',
          'tsx',
          '--conditions=@stayledger/source',
          'jobs/bench/bench.ts',
          ...process.argv.slice(2),
        ],
        'inherit',
      );
