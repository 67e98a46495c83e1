import type { SeededRandom } from './seeded-random.js';

/** Conditions of one outing, as a logbook would sum them up. */
export interface Conditions {
  /** Mean apparent wind, knots. */
  windKn: number;
  /** Mean of the highest third of the waves, metres. */
  waveHeightM: number;
  /** Period between the waves met, seconds. */
  wavePeriodS: number;
}

const WAVE_COMPONENTS = 6;
/** How long a gust or a lull lasts, and how strongly it swings about the mean; common practice, no source. */
const GUST_TIME_S = 25;
const GUST_SPREAD = 0.13;
const DRIFT_TIME_S = 1800;
const DRIFT_SPREAD = 0.1;

/** Wind and sea second by second: slow drift and gusts about a mean, and a sea of a few wave trains. Invented. */
export class SailingWeather {
  #gust = 0;
  #drift = 0;
  #waves: { frequencyHz: number; amplitude: number; phase: number }[] = [];

  constructor(
    private readonly conditions: Conditions,
    private readonly random: SeededRandom,
  ) {
    for (let i = 0; i < WAVE_COMPONENTS; i++) {
      this.#waves.push({
        frequencyHz: (1 / conditions.wavePeriodS) * random.between(0.75, 1.35),
        amplitude: random.between(0.5, 1),
        phase: random.between(0, 2 * Math.PI),
      });
    }
    const power = this.#waves.reduce((sum, wave) => sum + wave.amplitude ** 2 / 2, 0);
    // Significant height is four standard deviations of the surface.
    const scale = conditions.waveHeightM / 4 / Math.sqrt(power);
    for (const wave of this.#waves) wave.amplitude *= scale;
  }

  /** Moves on by `dtS` seconds and gives the apparent wind (knots) and the surface above its mean (metres). */
  step(timeS: number, dtS: number): { windKn: number; surfaceM: number } {
    this.#gust = this.wander(this.#gust, GUST_TIME_S, GUST_SPREAD, dtS);
    this.#drift = this.wander(this.#drift, DRIFT_TIME_S, DRIFT_SPREAD, dtS);
    let surfaceM = 0;
    for (const wave of this.#waves) {
      surfaceM += wave.amplitude * Math.sin(2 * Math.PI * wave.frequencyHz * timeS + wave.phase);
    }
    return { windKn: Math.max(0, this.conditions.windKn * (1 + this.#gust + this.#drift)), surfaceM };
  }

  /** One step of a process that forgets its past over `timeS` and keeps a standard deviation of `spread`. */
  private wander(value: number, timeS: number, spread: number, dtS: number): number {
    const keep = Math.exp(-dtS / timeS);
    return value * keep + spread * Math.sqrt(1 - keep * keep) * this.random.normal();
  }
}
