import { execFile } from 'node:child_process';
import { parseArgs, promisify } from 'node:util';
import type { BenchValue } from './bench-row.js';
import { REGISTRY } from './registry.js';

/**
 * `npm run bench`: measures each row in a process of its own and prints a table; `-- --json` one JSON object of name
 * and value; `-- --only NAME` one row. Exit status 1 when a row failed: a wrong result is no result.
 */

const run = promisify(execFile);

/** What the process of one row says. */
interface Measured {
  values: BenchValue[];
  measured: Record<string, number>;
}

async function main(): Promise<void> {
  const { values: options } = parseArgs({
    options: { json: { type: 'boolean' }, only: { type: 'string' }, row: { type: 'string' } },
  });
  if (options.row !== undefined) return measureHere(Number(options.row));
  const { only } = options;
  const wanted = [...REGISTRY.keys()].filter(
    (index) => only === undefined || REGISTRY[index].values.includes(only),
  );
  if (wanted.length === 0) {
    const names = REGISTRY.flatMap(({ values }) => values).join(', ');
    throw new Error(`there is no row "${only}"; there are ${names}`);
  }
  const all: Record<string, number> = {};
  for (const index of wanted) {
    if (!options.json) process.stderr.write(`measuring ${REGISTRY[index].values.join(', ')} …\n`);
    try {
      const { values, measured } = await measureApart(index);
      for (const value of values) {
        if (only !== undefined && value.name !== only) continue;
        all[value.name] = measured[value.name];
        if (!options.json) process.stdout.write(`${lineOf(value, measured[value.name])}\n`);
      }
    } catch (error) {
      process.exitCode = 1;
      process.stderr.write(`${REGISTRY[index].values.join(', ')} failed: ${messageOf(error)}\n`);
    }
  }
  if (options.json) process.stdout.write(`${JSON.stringify(all)}\n`);
}

async function measureHere(index: number): Promise<void> {
  const row = await REGISTRY[index].load();
  const measured = await row.run();
  process.stdout.write(JSON.stringify({ values: row.values, measured }));
}

async function measureApart(index: number): Promise<Measured> {
  const args = [...process.execArgv, __filename, '--row', String(index)];
  const { stdout } = await run(process.execPath, args, { maxBuffer: 1 << 26 });
  return JSON.parse(stdout) as Measured;
}

function messageOf(error: unknown): string {
  if (error instanceof Error && 'stderr' in error) return String(error.stderr).trim();
  return error instanceof Error ? error.message : String(error);
}

function lineOf({ name, what, better, reach, ambition }: BenchValue, value: number): string {
  const shown = (figure: number) => String(Number(figure.toPrecision(3)));
  const sign = better === 'higher' ? '>=' : '<=';
  const bound =
    better === 'within'
      ? `${reach}..${ambition}`
      : `${sign} ${reach}${ambition === null ? '' : ` (${ambition})`}`;
  return [name.padEnd(18), shown(value).padStart(8), bound.padStart(16), `  ${verdict()}`, `  ${what}`].join(
    '',
  );

  function verdict(): string {
    if (better === 'within')
      return value >= reach && value <= (ambition ?? Infinity) ? 'reached ' : 'MISSED  ';
    const reaches = (limit: number) => (better === 'higher' ? value >= limit : value <= limit);
    if (ambition !== null && reaches(ambition)) return 'ambition';
    return reaches(reach) ? 'reached ' : 'MISSED  ';
  }
}

main().catch((error: unknown) => {
  process.stderr.write(`${messageOf(error)}\n`);
  process.exitCode = 1;
});
