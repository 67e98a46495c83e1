import { damageOfSpectrum } from '@stayledger/shared/fatigue/damage/damage-of-spectrum';
import { RainflowCounter } from '@stayledger/shared/fatigue/rainflow/rainflow-counter';
import type { BenchRow } from './bench-row.js';
import { makeHistory } from './make-history.js';
import { busyMs, median, ROUNDS } from './measure.js';
import { expectSame, MODEL, slowDamage } from './slow-damage.js';

const SAMPLES = 8_000_000;
const STEP_KN = 0.02;
const BLOCK = 4096;

/** Turning points, four-point rule and damage of doubles in memory, on one thread. */
export const countingRow: BenchRow = {
  values: [
    {
      name: 'countingSmooth',
      what: 'million samples/s, a tenth of them turning points',
      better: 'higher',
      reach: 60,
      ambition: 110,
    },
    {
      name: 'countingNoisy',
      what: 'million samples/s, four tenths of them turning points',
      better: 'higher',
      reach: 30,
      ambition: 55,
    },
  ],
  async run() {
    return { countingSmooth: await speedOf(0.1), countingNoisy: await speedOf(0.9) };
  },
};

async function speedOf(noiseKn: number): Promise<number> {
  const loads = makeHistory(SAMPLES, noiseKn, 11);
  const blocks: Float64Array[] = [];
  for (let from = 0; from < SAMPLES; from += BLOCK) blocks.push(loads.subarray(from, from + BLOCK));
  const times: number[] = [];
  let damage = 0;
  for (let round = 0; round <= ROUNDS; round++) {
    const time = await busyMs(() => {
      const counter = new RainflowCounter({ step: STEP_KN });
      for (const block of blocks) counter.push(block, block.length, 0);
      damage = damageOfSpectrum(counter.spectrum(), MODEL).damage;
    });
    if (round > 0) times.push(time);
  }
  expectSame('counting', damage, slowDamage(loads, STEP_KN));
  return SAMPLES / 1000 / median(times);
}
