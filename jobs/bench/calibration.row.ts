import {
  calibrate,
  type Calibration,
  type Coverage,
} from '@stayledger/shared/fatigue/uncertainty/calibration/calibrate';
import type { Misfit, Stratum } from '@stayledger/shared/fatigue/uncertainty/calibration/synthetic-vessel';
import type { BenchRow } from './bench-row.js';

const VESSELS = 20_000;
const VESSELS_OF_STRATUM = 3000;
/** Other vessels than those of the specs. */
const FIRST_SEED = 1_000_001;
const SAMPLING_ERROR = 3 * Math.sqrt(0.09 / VESSELS);
/** A world that breaks what the method assumes; shown, never tuned to. */
const MISFIT: Misfit = { loggerOffAboveKn: 22, gainBias: 0.05, seasonCov: 0.5, curveOffBySd: 1 };
const STRATA: readonly Stratum[] = ['one-season', 'under-10-days', 'half-unlogged', 'no-wind'];

/** Dates of simulated vessels against their known truth. Its slow path is that truth, lived through day by day. */
export const calibrationRow: BenchRow = {
  values: [
    {
      name: 'calibration90',
      what: 'share of true lives between the 5th and 95th percentile',
      better: 'within',
      reach: 0.9 - SAMPLING_ERROR,
      ambition: 0.9 + SAMPLING_ERROR,
    },
    {
      name: 'calibrationBias',
      what: 'mean of ln(true life / median), without its sign',
      better: 'lower',
      reach: 0.02,
      ambition: null,
    },
  ],
  run() {
    const whole = calibrate({ vessels: VESSELS, firstSeed: FIRST_SEED, stratum: 'mixed' });
    report('all', whole);
    for (const stratum of STRATA) {
      report(stratum, calibrate({ vessels: VESSELS_OF_STRATUM, firstSeed: FIRST_SEED, stratum }));
    }
    report(
      'assumptions broken',
      calibrate({ vessels: VESSELS_OF_STRATUM, firstSeed: FIRST_SEED, stratum: 'mixed', misfit: MISFIT }),
    );
    const { between5And95, bias } = whole.life;
    return { calibration90: between5And95, calibrationBias: Math.abs(bias) };
  },
};

/** A line of the closing table, on standard error: standard output belongs to the values. */
function report(name: string, { life, fan }: Calibration): void {
  process.stderr.write(`  ${name.padEnd(20)} life ${lineOf(life)}; allowance in five years ${lineOf(fan)}\n`);
}

function lineOf({ vessels, between5And95, bias, biasError, transform }: Coverage): string {
  const expected = vessels / transform.length;
  const chiSquare = transform.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
  return `${(100 * between5And95).toFixed(1)} % of ${vessels}, bias ${bias.toFixed(3)} ± ${biasError.toFixed(3)}, chi-square ${chiSquare.toFixed(0)} of 19`;
}
