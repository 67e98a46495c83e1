import type { Curve } from '../../curves/curve.js';
import type { DetailModel } from '../../damage/detail-model.js';
import { cycleTableOf } from '../../rainflow/cycle-table.js';
import { emptySpectrum, type LoadSpectrum } from '../../rainflow/load-spectrum.js';
import { lnSdOfCov, lnSdOfLog10Sd } from '../../statistics/lognormal.js';
import { normalQuantile } from '../../statistics/normal.js';
import { normalSource } from '../../statistics/normal-source.js';
import { randomStreams } from '../../statistics/random-streams.js';
import type { RandomSource } from '../../statistics/seeded-random.js';
import type { UsageGroup } from '../../usage/usage-state.js';
import { damageGrid } from '../damage-grid.js';
import { CARRIED_IN_COV } from '../../usage/carried-in.js';
import { MINER_COV, type DamageShare, type PartRecord, type UseDay, type UseRecord } from '../life-record.js';

/** What kind of record a simulated vessel has. */
export type Stratum = 'mixed' | 'one-season' | 'under-10-days' | 'half-unlogged' | 'no-wind';

/** Ways in which a simulated vessel breaks what the method assumes. Never tuned to. */
export interface Misfit {
  /** In winds above this the logger is off, knots. */
  loggerOffAboveKn: number;
  /** Recorded loads are too high by this share. */
  gainBias: number;
  seasonCov: number;
  /** The true mean curve lies so many standard deviations below the one used. */
  curveOffBySd: number;
}

/** A simulated vessel: what its logs would show, and what really happens to it. */
export interface SyntheticVessel {
  use: UseRecord;
  part: PartRecord;
  truth: {
    /** Years from today at which the part really fails, at the planned hours; below zero: it already has. */
    lifeYears: number;
    /** Years it has been in use, at the planned hours. */
    pastYears: number;
    /** Design damage after five more years, at the true loads, without doubt about stress or curve. */
    designDamageInFiveYears: number;
  };
}

/** Years ahead at which the forecast of damage is compared with what happened. */
export const FORECAST_YEARS = 5;
const HORIZON_YEARS = 120;
const HOURS_A_DAY = 6;
const WAVE_HZ = 0.15;
const REEFING_KN = 23;
const BANDS_KN = [11, 17, 22, Infinity];
/** Rayleigh ranges as twelve levels of equal probability: the medians of the twelfths. */
const LEVELS = Array.from({ length: 12 }, (_, i) => Math.sqrt(-2 * Math.log(1 - (i + 0.5) / 12)));
const STEP_KN = 0.005;
const WIND_MEDIAN_KN = 13;
const DAY_LN_SD = 0.28;
const WATCH_LN_SD = 0.21;
const WATCHES = 3;

/** Weather that persists from day to day (half of today's departure stays) and varies between the watches of a day. */
class Weather {
  private day: number;
  constructor(private readonly normal: () => number) {
    this.day = normal();
  }
  /** Wind of the watches of the next day. */
  nextDayKn(): number[] {
    this.day = 0.5 * this.day + Math.sqrt(0.75) * this.normal();
    return Array.from(
      { length: WATCHES },
      () => WIND_MEDIAN_KN * Math.exp(DAY_LN_SD * this.day + WATCH_LN_SD * this.normal()),
    );
  }
}

/**
 * Range scale at this wind, kN. Loads grow with the wind to the power 1.5, half-way between loads set by heel and by
 * sail pressure, until sail is shortened.
 */
function scaleKn(windKn: number): number {
  return 2 * (Math.min(windKn, REEFING_KN) / 15) ** 1.5;
}

/**
 * A simulated vessel with known truth. Its loads, weather, seasons, load cell, curve and Miner sum are drawn from the
 * distributions the method claims to know, unless a misfit is asked for. Invented, with no claim on any real rig.
 *
 * @param seed whole number; the same vessel for the same seed
 * @param stratum kind of record
 * @param misfit how to break the assumptions; left out: not at all
 */
export function syntheticVessel(seed: number, stratum: Stratum, misfit?: Misfit): SyntheticVessel {
  const streams = randomStreams(seed);
  const random = streams('vessel');
  const between = (low: number, high: number): number => low + (high - low) * random();
  const normal = normalSource(streams('truth'));
  const lnFactor = (cov: number): number => lnSdOfCov(cov) * normal() - lnSdOfCov(cov) ** 2 / 2;

  // What the vessel is like.
  const seasons = stratum === 'one-season' || stratum === 'under-10-days' ? 1 : 1 + Math.floor(random() * 3);
  const daysOfSeason = (): number =>
    stratum === 'under-10-days' ? Math.floor(between(4, 10)) : Math.floor(between(12, 61));
  const unloggedShare = stratum === 'half-unlogged' ? 0.5 : between(0, 0.3);
  const windKnown = stratum !== 'no-wind' && (stratum !== 'mixed' || random() < 0.7);
  const seasonCov = 0.3;
  const gainCov = random() < 0.5 ? 0.1 : 0.03;
  const stressCov = 0.1;
  const curveSd = between(0.18, 0.25);
  const modelSd = random() < 0.5 ? 0.25 : 0;
  const plannedHours = between(200, 700);
  const carriedInHours = random() < 0.5 ? 0 : between(100, 1500);
  const mean = meanCurve(random, plannedHours, between(5, 30));

  // What is true of it, and unknown.
  const trueOverRecorded =
    misfit === undefined ? Math.exp(lnFactor(gainCov)) : Math.exp(lnFactor(gainCov)) / (1 + misfit.gainBias);
  const stress = Math.exp(lnFactor(stressCov));
  const lnLife =
    lnSdOfLog10Sd(Math.hypot(curveSd, modelSd)) * normal() -
    (misfit?.curveOffBySd ?? 0) * lnSdOfLog10Sd(curveSd);
  const minerSum = Math.exp(lnFactor(MINER_COV));
  const season = (): number => Math.exp(lnFactor(misfit?.seasonCov ?? seasonCov));
  const trueRate = rateByWind(mean, stress);
  const loadRate = rateByWind(mean, 1);

  // The past, day by day.
  const groups: UsageGroup[] = windKnown
    ? BANDS_KN.map((_, band) => ({ state: 'sailing', band }))
    : [{ state: 'sailing', band: null }];
  const weather = new Weather(normalSource(streams('weather')));
  const days: UseDay[] = [];
  const logged: LoggedWatch[] = [];
  const past: { hours: number; damage: number }[] = [];
  let trueDamage = 0;
  let loadDamage = 0;
  for (let s = 0; s < seasons; s++) {
    const factor = season();
    const loggedDays = daysOfSeason();
    const allDays = Math.round(loggedDays / (1 - unloggedShare));
    const isLogged = choose(loggedDays, allDays, random);
    for (let d = 0; d < allDays; d++) {
      const loggedHours = groups.map(() => 0);
      const unloggedHours = groups.map(() => 0);
      for (const windKn of weather.nextDayKn()) {
        const hours = between(1, 3);
        const damage = factor * hours * trueRate(windKn);
        past.push({ hours, damage });
        trueDamage += damage;
        loadDamage += factor * hours * loadRate(windKn);
        const group = windKnown ? BANDS_KN.findIndex((bound) => windKn < bound) : 0;
        const on = isLogged[d] && !(misfit !== undefined && windKn > misfit.loggerOffAboveKn);
        if (on) logged.push({ day: days.length, group, windKn, cycles: factor * hours * 3600 * WAVE_HZ });
        (on ? loggedHours : unloggedHours)[group] += hours;
      }
      days.push({ season: s, loggedHours, unloggedHours });
    }
  }
  if (logged.length === 0) return syntheticVessel(seed + 1_000_003, stratum, misfit);
  const carriedIn = Math.exp(lnFactor(CARRIED_IN_COV)) * carriedInHours;
  past.unshift({ hours: carriedInHours, damage: carriedIn * meanRate(trueRate) });
  trueDamage += past[0].damage;
  loadDamage += carriedIn * meanRate(loadRate);

  // The future.
  const daysAYear = Math.max(1, Math.round(plannedHours / HOURS_A_DAY));
  const hoursADay = plannedHours / daysAYear;
  const failsAt = minerSum * Math.exp(lnLife);
  const pastYears = past.reduce((sum, { hours }) => sum + hours, 0) / plannedHours;
  let lifeYears = trueDamage >= failsAt ? hoursUntil(past, failsAt) / plannedHours - pastYears : Infinity;
  let inFiveYears = loadDamage;
  let year = 0;
  for (; year < HORIZON_YEARS && (lifeYears === Infinity || year < FORECAST_YEARS); year++) {
    const factor = season();
    let ofYear = 0;
    let ofLoads = 0;
    for (let d = 0; d < daysAYear; d++) {
      for (const windKn of weather.nextDayKn()) {
        ofYear += factor * (hoursADay / WATCHES) * trueRate(windKn);
        if (year < FORECAST_YEARS) ofLoads += factor * (hoursADay / WATCHES) * loadRate(windKn);
      }
    }
    if (lifeYears === Infinity && trueDamage + ofYear >= failsAt) {
      lifeYears = year + (failsAt - trueDamage) / ofYear;
    }
    trueDamage += ofYear;
    inFiveYears += ofLoads;
  }
  if (lifeYears === Infinity) {
    lifeYears = HORIZON_YEARS + (failsAt - trueDamage) / (meanRate(trueRate) * plannedHours);
  }

  const record = loggedSpectrum(logged, trueOverRecorded);
  const detail: DetailModel = { ...PLAIN, curve: mean };
  const lnSd = Math.hypot(lnSdOfCov(gainCov), lnSdOfCov(stressCov));
  return {
    use: {
      groups,
      days,
      otherUnloggedHours: [],
      plannedHoursPerYear: { sailing: plannedHours },
      seasonCov,
      calibrations: [{ key: 'cell', gainCov }],
    },
    part: {
      key: 'part',
      name: 'simulated stay',
      lossDropsMast: true,
      basisCov: 0,
      carriedInHours,
      details: [
        {
          key: 'wire',
          name: 'free length',
          grid: damageGrid(
            record,
            detail,
            days.map((_, index) => index),
            lnSd,
          ),
          shares: damageShares(logged, mean, trueOverRecorded),
          calibrationOfDay: days.map(() => 0),
          designOverMean: 10 ** (2 * curveSd),
          designFatigueFactor: 5,
          curveLnSd: lnSdOfLog10Sd(Math.hypot(curveSd, modelSd)),
          stressCov,
          sampling: { factor: 1, lnSd: 0 },
        },
      ],
    },
    truth: { lifeYears, pastYears, designDamageInFiveYears: inFiveYears * 10 ** (2 * curveSd) },
  };
}

const PLAIN: Omit<DetailModel, 'curve'> = {
  factor: 1,
  stressConcentration: 1,
  sizeFactor: 1,
  lifeDivisor: 1,
  cutOff: 'as-curve',
  mean: { kind: 'none' },
  endBending: null,
};

/** A curve of one or two slopes that gives the planned hours about so many years, with its knee among the ranges. */
function meanCurve(random: RandomSource, plannedHours: number, years: number): Curve {
  const m = 3 + 2 * random();
  const lower = random() < 0.3 ? m : m + 2;
  const knee = 1 + 4 * random();
  const shape: Curve = {
    segments: [
      { above: knee, m, log10a: m * Math.log10(knee) },
      { above: 0, m: lower, log10a: lower * Math.log10(knee) },
    ],
  };
  const shift = Math.log10(meanRate(rateByWind(shape, 1)) * plannedHours * years);
  return { segments: shape.segments.map((segment) => ({ ...segment, log10a: segment.log10a + shift })) };
}

/** Damage per hour at a wind, at the true loads times a factor; tabled in the logarithm of the range scale. */
function rateByWind(curve: Curve, factor: number): (windKn: number) => number {
  const nodes = 200;
  const highest = scaleKn(REEFING_KN);
  const table = new Float64Array(nodes + 1);
  for (let i = 0; i <= nodes; i++) {
    const scale = highest * (i / nodes) ** 2;
    let damage = 0;
    for (const level of LEVELS)
      damage += damageOfRange(curve, factor * Math.round((scale * level) / STEP_KN) * STEP_KN);
    table[i] = (damage / LEVELS.length) * 3600 * WAVE_HZ;
  }
  return (windKn) => {
    const at = Math.sqrt(scaleKn(windKn) / highest) * nodes;
    const below = Math.min(Math.floor(at), nodes - 1);
    return table[below] + (table[below + 1] - table[below]) * (at - below);
  };
}

function damageOfRange(curve: Curve, range: number): number {
  const segment = curve.segments.find(({ above }) => range >= above);
  return segment === undefined || range === 0 ? 0 : range ** segment.m / 10 ** segment.log10a;
}

interface LoggedWatch {
  day: number;
  group: number;
  windKn: number;
  cycles: number;
}

/** What the load cell made of one watch. */
function watchCycles(
  { windKn, cycles }: LoggedWatch,
  trueOverRecorded: number,
): [high: number, count: number][] {
  return LEVELS.map((level) => [
    Math.round((scaleKn(windKn) * level) / trueOverRecorded / STEP_KN),
    cycles / LEVELS.length,
  ]);
}

/** What the load cell made of the logged days. */
function loggedSpectrum(logged: readonly LoggedWatch[], trueOverRecorded: number): LoadSpectrum {
  const byDay = new Map<number, [number, number][]>();
  for (const watch of logged) {
    const cycles = byDay.get(watch.day) ?? [];
    cycles.push(...watchCycles(watch, trueOverRecorded));
    byDay.set(watch.day, cycles);
  }
  return {
    ...emptySpectrum(STEP_KN),
    days: [...byDay].map(([day, cycles]) => ({
      day,
      cycles: cycleTableOf(
        cycles.map(() => 0),
        cycles.map(([high]) => high),
        cycles.map(([, count]) => count),
      ),
    })),
  };
}

/** How the damage of each logged day splits over its wind bands, at the recorded loads. */
function damageShares(logged: readonly LoggedWatch[], curve: Curve, trueOverRecorded: number): DamageShare[] {
  const damages = logged.map((watch) =>
    watchCycles(watch, trueOverRecorded).reduce(
      (sum, [high, count]) => sum + count * damageOfRange(curve, high * STEP_KN),
      0,
    ),
  );
  const ofDay = new Map<number, number>();
  const ofGroup = new Map<number, Map<number, number>>();
  logged.forEach(({ day, group }, i) => {
    const groups = ofGroup.get(day) ?? new Map<number, number>();
    groups.set(group, (groups.get(group) ?? 0) + damages[i]);
    ofGroup.set(day, groups);
    ofDay.set(day, (ofDay.get(day) ?? 0) + damages[i]);
  });
  return [...ofGroup].flatMap(([day, groups]) =>
    [...groups].map(([group, damage]) => ({ day, group, share: damage / (ofDay.get(day) ?? 1) })),
  );
}

/** Hours until the damage of the past, in order of time, reached a level. */
function hoursUntil(past: readonly { hours: number; damage: number }[], level: number): number {
  let passed = 0;
  let sum = 0;
  for (const { hours, damage } of past) {
    if (sum + damage >= level) return passed + (hours * (level - sum)) / damage;
    passed += hours;
    sum += damage;
  }
  return passed;
}

/** So many of so many, chosen evenly. */
function choose(wanted: number, from: number, random: RandomSource): boolean[] {
  const chosen: boolean[] = [];
  let left = wanted;
  for (let i = 0; i < from; i++) {
    const take = random() < left / (from - i);
    chosen.push(take);
    if (take) left--;
  }
  return chosen;
}

/** Medians of 400 slices of equal probability of the standard normal distribution. */
const NORMAL_SLICES = Array.from({ length: 400 }, (_, i) => normalQuantile((i + 0.5) / 400));

/** Damage per hour in the long run: the mean over the wind. */
function meanRate(rate: (windKn: number) => number): number {
  let sum = 0;
  for (const slice of NORMAL_SLICES)
    sum += rate(WIND_MEDIAN_KN * Math.exp(Math.hypot(DAY_LN_SD, WATCH_LN_SD) * slice));
  return sum / NORMAL_SLICES.length;
}
