import { seededRandom } from './seeded-random.js';

/**
 * A seeded load history in kN, to the resolution of a recorder (0.001 kN): waves in groups on a slow trend, with
 * white noise.
 *
 * @param noiseKn half width of the noise: 0.1 turns at about a tenth of the samples, 0.9 at about four tenths
 */
export function makeHistory(samples: number, noiseKn: number, seed: number): Float64Array {
  const random = seededRandom(seed);
  const loads = new Float64Array(samples);
  for (let i = 0; i < samples; i++) {
    const group = 6 + 4 * Math.sin(i / 5000);
    const noise = (random() + random() + random() - 1.5) * 2 * noiseKn;
    const load = 20 + group * Math.sin((2 * Math.PI * i) / 22) + 2 * Math.sin(i / 311) + noise;
    loads[i] = Math.round(load * 1000) / 1000;
  }
  return loads;
}
