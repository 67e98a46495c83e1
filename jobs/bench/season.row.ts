import { damageOfSpectrum } from '@stayledger/shared/fatigue/damage/damage-of-spectrum';
import type { LoadSpectrum } from '@stayledger/shared/fatigue/rainflow/load-spectrum';
import { mergeAll } from '@stayledger/shared/fatigue/rainflow/merge-spectra';
import { encodeSpectrum } from '@stayledger/shared/fatigue/rainflow/spectrum-codec';
import { spectrumOf } from '@stayledger/shared/fatigue/rainflow/spectrum-of';
import type { BenchRow } from './bench-row.js';
import { makeHistory } from './make-history.js';
import { alternate, busyMs } from './measure.js';
import { expectSame, MODEL, slowDamage } from './slow-damage.js';

const STEP_KN = 0.02;
const LOGS = 1000;
/** Four hours at 1 Hz. */
const LOG_SAMPLES = 4 * 3600;
/** A season of 100 days of six hours at 4 Hz. */
const SEASON_DAYS = 100;
const DAY_SAMPLES = 6 * 3600 * 4;

/** What people wait for after the counting: a life joined from its logs, another curve over a season. */
export const seasonRow: BenchRow = {
  values: [
    {
      name: 'lifeMergeMs',
      what: 'ms to merge 1,000 logs of one channel',
      better: 'lower',
      reach: 50,
      ambition: null,
    },
    {
      name: 'newCurveMs',
      what: 'ms for a new curve over a counted season',
      better: 'lower',
      reach: 50,
      ambition: 5,
    },
  ],
  async run() {
    const life = makeHistory(LOGS * LOG_SAMPLES, 0.3, 5);
    const logs = Array.from({ length: LOGS }, (_, i) =>
      spectrumOf(life.subarray(i * LOG_SAMPLES, (i + 1) * LOG_SAMPLES), { step: STEP_KN, day: i }),
    );
    const season = seasonSpectrum();
    let merged: LoadSpectrum = logs[0];
    let damage = 0;
    const times = await alternate(
      {
        lifeMergeMs: () => (merged = mergeAll(logs)),
        newCurveMs: () => (damage = damageOfSpectrum(season.spectrum, MODEL).damage),
      },
      busyMs,
    );
    const onePass = spectrumOf(life, {
      step: STEP_KN,
      day: Int32Array.from(life, (_, i) => Math.floor(i / LOG_SAMPLES)),
    });
    if (Buffer.compare(encodeSpectrum(merged), encodeSpectrum(onePass)) !== 0) {
      throw new Error('the merged life is not that of one pass');
    }
    expectSame('merged life', damageOfSpectrum(merged, MODEL).damage, slowDamage(life, STEP_KN));
    expectSame('season', damage, slowDamage(season.loads, STEP_KN));
    return times;
  },
};

function seasonSpectrum(): { spectrum: LoadSpectrum; loads: Float64Array } {
  const loads = makeHistory(SEASON_DAYS * DAY_SAMPLES, 0.2, 9);
  const days = Int32Array.from(loads, (_, i) => Math.floor(i / DAY_SAMPLES));
  return { spectrum: spectrumOf(loads, { step: STEP_KN, day: days }), loads };
}
