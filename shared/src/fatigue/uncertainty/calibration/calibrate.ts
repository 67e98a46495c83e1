import { fastNormalCdf } from '../../statistics/fast-normal-cdf.js';
import { randomStreams } from '../../statistics/random-streams.js';
import { damageAt } from '../damage-at.js';
import { failureProbabilityAt } from '../failure-probability-at.js';
import { FAN_DOUBTS } from '../forecast-fan.js';
import { lifeDraws } from '../life-draws.js';
import { type PartLife, partLife } from '../part-life.js';
import { yearsToFailureProbability } from '../years-to-failure-probability.js';
import { yearsToLevel } from '../years-to-level.js';
import {
  FORECAST_YEARS,
  type Misfit,
  type Stratum,
  type SyntheticVessel,
  syntheticVessel,
} from './synthetic-vessel.js';

/** How well forecasts of one kind met what happened. */
export interface Coverage {
  vessels: number;
  /** Share of truths between the 5th and the 95th percentile of their forecasts; 0.90 when all is well. */
  between5And95: number;
  /** Mean of ln(truth / forecast median); 0 when all is well. */
  bias: number;
  /** Standard error of the bias. */
  biasError: number;
  /** Twenty counts of where in its forecast each truth fell; even when all is well. */
  transform: number[];
}

/** The forecasts that are tested: life to failure (reliability), and design damage in five years (the fan). */
export interface Calibration {
  life: Coverage;
  /** Without vessels where it was left out. */
  fan: Coverage;
}

const FAR_YEARS = 1e5;

/**
 * Tests dates on simulated vessels whose truth is known: for each, the record is assessed as a real one would be, and
 * the truth is looked up in the forecast.
 *
 * @param options vessels: how many; firstSeed: vessels take this seed and those following; draws: per vessel;
 * withFan: false leaves the fan out, at half the time
 * No record of real failures stands behind it.
 */
export function calibrate(options: {
  vessels: number;
  firstSeed: number;
  stratum: Stratum;
  misfit?: Misfit;
  draws?: number;
  withFan?: boolean;
}): Calibration {
  const { vessels, firstSeed, stratum, misfit, draws = 250, withFan = true } = options;
  const life = new Tally();
  const fan = new Tally();
  for (let i = 0; i < vessels; i++) {
    const seed = firstSeed + i;
    const { use, part, truth } = syntheticVessel(seed, stratum, misfit);
    const shared = lifeDraws(use, randomStreams(seed ^ 0x5bd1e995), { draws, years: 30 });
    const forecast = partLife(shared, part);
    life.add(placeOfLife(forecast, truth), lnOverMedianLife(forecast, truth));
    if (!withFan) continue;
    const expected = fanAt(partLife(shared, part, FAN_DOUBTS));
    fan.add(
      placeIn(expected, truth.designDamageInFiveYears),
      Math.log(truth.designDamageInFiveYears / expected[expected.length >> 1]),
    );
  }
  return { life: life.coverage(), fan: fan.coverage() };
}

/** Where in its forecast a life ended. */
function placeOfLife(forecast: PartLife, { lifeYears, pastYears }: SyntheticVessel['truth']): number {
  if (lifeYears >= 0) return failureProbabilityAt(forecast, lifeYears);
  return failedInPast(forecast, (pastYears + lifeYears) / pastYears);
}

/**
 * ln of true over median life, both counted from the day the part was fitted: counted from today, lives that already
 * ended would drop out, and those that are left would seem too long.
 */
function lnOverMedianLife(forecast: PartLife, { lifeYears, pastYears }: SyntheticVessel['truth']): number {
  const median =
    failureProbabilityAt(forecast, 0) >= 0.5
      ? pastYears * yearsToLevel((share) => failedInPast(forecast, share), 0.5, 1)
      : pastYears + yearsToFailureProbability(forecast, 0.5, FAR_YEARS);
  return Math.log((pastYears + lifeYears) / median);
}

/** Probability that a part of one detail failed within a share of its past, whose damage fell evenly. */
function failedInPast({ draws, paths, curveLnSds, lnMinerSums }: PartLife, share: number): number {
  let sum = 0;
  for (let i = 0; i < draws.draws; i++) {
    const damage = share * damageAt(paths[0], i, 0, undefined);
    sum += fastNormalCdf((Math.log(damage) - lnMinerSums[i]) / curveLnSds[0]);
  }
  return sum / draws.draws;
}

function fanAt(forecast: PartLife): Float64Array {
  const { draws, paths, part } = forecast;
  const values = new Float64Array(draws.draws);
  for (let i = 0; i < values.length; i++) {
    values[i] = part.details[0].designOverMean * damageAt(paths[0], i, FORECAST_YEARS, undefined);
  }
  return values.sort();
}

function placeIn(sorted: Float64Array, value: number): number {
  let below = 0;
  while (below < sorted.length && sorted[below] < value) below++;
  return (below + 0.5) / (sorted.length + 1);
}

class Tally {
  private readonly transform = new Array<number>(20).fill(0);
  private vessels = 0;
  private inside = 0;
  private sum = 0;
  private squares = 0;

  add(place: number, lnRatio: number): void {
    this.vessels++;
    this.transform[Math.min(Math.floor(place * 20), 19)]++;
    if (place >= 0.05 && place <= 0.95) this.inside++;
    this.sum += lnRatio;
    this.squares += lnRatio * lnRatio;
  }

  coverage(): Coverage {
    const bias = this.sum / this.vessels;
    return {
      vessels: this.vessels,
      between5And95: this.inside / this.vessels,
      bias,
      biasError: Math.sqrt((this.squares / this.vessels - bias * bias) / this.vessels),
      transform: [...this.transform],
    };
  }
}
