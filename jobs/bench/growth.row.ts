import { execFileSync } from 'node:child_process';
import { join } from 'node:path';
import type { BenchRow } from './bench-row.js';
import { LOG_CONFIG } from './log-config.js';
import { makeLogFile } from './make-log-file.js';
import { median } from './measure.js';
import { expectSame, MODEL } from './slow-damage.js';
import { slowLogDamage } from './slow-log-damage.js';

const SMALL = 1_000_000;
const LARGE = 10_000_000;
const ROUNDS = 5;
/** Files counted before the two that are compared: both sides are then equally warm. */
const WARM_UPS = 2;

/** What a counting process says about itself. */
interface Process {
  residentMiB: number;
  /** One of each for each file. */
  busyMs: number[];
  damages: number[][];
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
    const memorySmall: number[] = [];
    const memoryLarge: number[] = [];
    const exponents: number[] = [];
    let damages: number[] = [];
    for (let round = 0; round < ROUNDS; round++) {
      bare.push(runProcess().residentMiB);
      memorySmall.push(runProcess(small).residentMiB);
      memoryLarge.push(runProcess(large).residentMiB);
      // The sides alternate in one process, and its first pair only warms the compiler up: timing a small file before
      // any large one charged the small side with compiling. Starting Node is no part of the growth either.
      const timed = runProcess(small, large, small, large);
      exponents.push(Math.log10(timed.busyMs[WARM_UPS + 1] / timed.busyMs[WARM_UPS]));
      damages = timed.damages[WARM_UPS];
    }
    const slow = await slowLogDamage(small, SMALL);
    slow.forEach((damage, i) => expectSame(`load column ${i + 1}`, damages[i], damage));
    return {
      memoryMiB: median(memoryLarge) - median(bare),
      memoryGrowthMiB: median(memoryLarge) - median(memorySmall),
      exponent: median(exponents),
    };
  },
};

function runProcess(...paths: string[]): Process {
  const output = execFileSync(process.execPath, [join(__dirname, 'count-file.mjs'), ...paths], {
    env: { BENCH_CONFIG: JSON.stringify(LOG_CONFIG), BENCH_MODEL: JSON.stringify(MODEL) },
    encoding: 'utf8',
  });
  return JSON.parse(output) as Process;
}
