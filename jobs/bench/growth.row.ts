import { execFileSync } from 'node:child_process';
import { join } from 'node:path';
import type { BenchRow } from './bench-row.js';
import { LOG_CONFIG } from './log-config.js';
import { makeLogFile } from './make-log-file.js';
import { median } from './measure.js';
import { DETAIL, expectSame } from './slow-damage.js';
import { slowLogDamage } from './slow-log-damage.js';

const SMALL = 1_000_000;
const LARGE = 10_000_000;
const ROUNDS = 5;

/** What a counting process says about itself. */
interface Process {
  residentMiB: number;
  busyMs: number;
  damages: number[];
}

/** Memory and time of processes that do nothing but count, from the build, without a loader. */
export const growthRow: BenchRow = {
  values: [
    {
      name: 'memoryMiB',
      what: 'peak resident memory of a process counting 10^7 rows over bare Node',
      better: 'lower',
      reach: 48,
      ambition: 24,
    },
    {
      name: 'memoryGrowthMiB',
      what: 'its growth from 10^6 to 10^7 rows',
      better: 'lower',
      reach: 8,
      ambition: 4,
    },
    {
      name: 'exponent',
      what: 'exponent of time from 10^6 to 10^7 rows',
      better: 'within',
      reach: 0.93,
      ambition: 1.07,
    },
  ],
  async run() {
    const small = makeLogFile(SMALL);
    const large = makeLogFile(LARGE);
    const bare: number[] = [];
    const processes: Record<'small' | 'large', Process[]> = { small: [], large: [] };
    for (let round = 0; round < ROUNDS; round++) {
      bare.push(runProcess().residentMiB);
      processes.small.push(runProcess(small));
      processes.large.push(runProcess(large));
    }
    const slow = await slowLogDamage(small, SMALL);
    slow.forEach((damage, i) => expectSame(`load column ${i + 1}`, processes.small[0].damages[i], damage));
    const memory = (of: Process[]) => median(of.map(({ residentMiB }) => residentMiB));
    const time = (of: Process[]) => median(of.map(({ busyMs }) => busyMs));
    return {
      memoryMiB: memory(processes.large) - median(bare),
      memoryGrowthMiB: memory(processes.large) - memory(processes.small),
      exponent: Math.log10(time(processes.large) / time(processes.small)),
    };
  },
};

function runProcess(path?: string): Process {
  const script = join(__dirname, 'count-file.mjs');
  const output = execFileSync(process.execPath, path === undefined ? [script] : [script, path], {
    env: { BENCH_CONFIG: JSON.stringify(LOG_CONFIG), BENCH_DETAIL: JSON.stringify(DETAIL) },
    encoding: 'utf8',
  });
  return JSON.parse(output) as Process;
}
