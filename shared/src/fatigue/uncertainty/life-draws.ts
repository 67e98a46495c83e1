import { usualBlockLength } from '../statistics/block-bootstrap.js';
import { lnSdOfCov } from '../statistics/lognormal.js';
import { normalSource } from '../statistics/normal-source.js';
import type { RandomStreams } from '../statistics/random-streams.js';
import type { RandomSource } from '../statistics/seeded-random.js';
import { CARRIED_IN_COV } from '../usage/carried-in.js';
import type { UsageState } from '../usage/usage-state.js';
import { groupsUnderSail, hoursUnderSail } from './days-under-sail.js';
import type { UseRecord } from './life-record.js';

/** Ways a year can turn out, drawn once and picked from. */
export const YEARS_IN_POOL = 256;
const MOST_DAYS_OF_A_YEAR = 366;

/** Stretches of recorded days strung together in blocks, one after the other. */
export interface YearPool {
  daysEach: number;
  days: Int32Array;
}

/** What is drawn once for the whole vessel: every part lives through the same loads, seasons and gains. */
export interface LifeDraws {
  use: UseRecord;
  streams: RandomStreams;
  draws: number;
  /** Years of the forecast that are drawn one by one. */
  years: number;
  /** Days drawn with replacement in blocks: draw i holds entries i * days.length and following. */
  resampledDays: Int32Array;
  /** Days of a block. */
  blockDays: number;
  /** Mean factor of the recorded seasons, weighted by their logged hours. */
  recordedSeasons: Float64Array;
  /** Factor of each coming season: draw i holds entries i * years and following. */
  comingSeasons: Float64Array;
  /** Which year of the pool each coming year is; same layout. */
  yearPicks: Uint8Array;
  /** Recorded days that make up each year of the pool. */
  yearPool: YearPool;
  /** The same for the stretch of unlogged hours, and which one each draw takes. */
  /** Null where there are none. */
  unloggedPool: YearPool | null;
  unloggedPicks: Uint8Array;
  /** Logarithm of true over recorded load, one array per calibration period. */
  lnGains: Float64Array[];
  /** Factor on what parts carried before their first log. */
  carriedIn: Float64Array;
}

/**
 * Draws everything that parts of a vessel share: days of the record in blocks of neighbours, seasons, gains. A factor
 * that is drawn here stays for a whole life.
 *
 * @param use the vessel's record
 * @param streams source of random numbers, see randomStreams
 * @param options draws: 2,000 unless given; years: horizon of the forecast, 60 unless given
 * @throws RangeError without a day with logged hours, or for a season spread below zero
 * Source: moving-block bootstrap of Kuensch (1989), from memory.
 */
export function lifeDraws(
  use: UseRecord,
  streams: RandomStreams,
  options: { draws?: number; years?: number } = {},
): LifeDraws {
  const { draws = 2000, years = 60 } = options;
  const logged = use.days.flatMap((day, index) => (sum(day.loggedHours) > 0 ? [index] : []));
  if (logged.length === 0) throw new RangeError('A forecast needs at least one day with recorded loads.');
  const days = use.days.length;
  const block = usualBlockLength(days);
  const weather = streams('days');
  const resampledDays = new Int32Array(draws * days);
  for (let i = 0; i < draws; i++) fillWithBlocks(resampledDays, i * days, days, days, block, weather);
  const loggedHours = sum(use.days.map((day) => sum(day.loggedHours)));
  const counted = groupsUnderSail(use);
  const hours = hoursUnderSail(use);
  const sailed = logged.filter((day) => hours[day] > 0);
  const hoursPerDay = sum([...hours]) / sailed.length;
  const plannedUnderSail = sum(
    (Object.entries(use.plannedHoursPerYear) as [UsageState, number][])
      .filter(([state]) => use.groups.some((group, index) => group.state === state && counted[index]))
      .map(([, planned]) => planned),
  );
  const unlogged = sum(use.otherUnloggedHours) + sum(use.days.map((day) => sum(day.unloggedHours)));
  return {
    use,
    streams,
    draws,
    years,
    resampledDays,
    blockDays: block,
    ...seasonsOf(use, loggedHours, draws, years, streams('seasons')),
    yearPicks: picks(draws * years, streams('years')),
    yearPool: poolOf(sailed, plannedUnderSail / hoursPerDay, streams('pool')),
    unloggedPool: unlogged > 0 ? poolOf(sailed, unlogged / hoursPerDay, streams('unlogged pool')) : null,
    unloggedPicks: picks(draws, streams('unlogged')),
    lnGains: use.calibrations.map(({ key, gainCov }) => lnFactors(draws, gainCov, streams(`gain ${key}`))),
    carriedIn: factors(draws, CARRIED_IN_COV, streams('carried in')),
  };
}

/**
 * Logarithms of lognormal factors of mean 1.
 *
 * @param count how many
 * @param cov coefficient of variation, zero or more
 */
export function lnFactors(count: number, cov: number, random: RandomSource): Float64Array {
  const lnSd = lnSdOfCov(cov);
  const normal = normalSource(random);
  const values = new Float64Array(count);
  for (let i = 0; i < count; i++) values[i] = lnSd * normal() - (lnSd * lnSd) / 2;
  return values;
}

function factors(count: number, cov: number, random: RandomSource): Float64Array {
  const values = lnFactors(count, cov, random);
  for (let i = 0; i < count; i++) values[i] = Math.exp(values[i]);
  return values;
}

function fillWithBlocks(
  target: Int32Array,
  offset: number,
  length: number,
  days: number,
  block: number,
  random: RandomSource,
): void {
  const starts = days - block + 1;
  for (let filled = 0; filled < length; filled += block) {
    const start = Math.floor(random() * starts);
    const end = Math.min(block, length - filled);
    for (let i = 0; i < end; i++) target[offset + filled + i] = start + i;
  }
}

function seasonsOf(
  use: UseRecord,
  loggedHours: number,
  draws: number,
  years: number,
  random: RandomSource,
): Pick<LifeDraws, 'recordedSeasons' | 'comingSeasons'> {
  const hoursOfSeason = new Map<number, number>();
  for (const day of use.days) {
    hoursOfSeason.set(day.season, (hoursOfSeason.get(day.season) ?? 0) + sum(day.loggedHours));
  }
  const weights = [...hoursOfSeason.values()]
    .filter((hours) => hours > 0)
    .map((hours) => hours / loggedHours);
  const recordedSeasons = new Float64Array(draws);
  for (const weight of weights) {
    const ofSeason = factors(draws, use.seasonCov, random);
    for (let i = 0; i < draws; i++) recordedSeasons[i] += weight * ofSeason[i];
  }
  return {
    recordedSeasons,
    comingSeasons: factors(draws * years, use.seasonCov, random),
  };
}

function picks(count: number, random: RandomSource): Uint8Array {
  const values = new Uint8Array(count);
  for (let i = 0; i < count; i++) values[i] = Math.floor(random() * YEARS_IN_POOL);
  return values;
}

function poolOf(logged: readonly number[], daysWanted: number, random: RandomSource): YearPool {
  const daysEach = Math.min(Math.max(Math.round(daysWanted), 1), MOST_DAYS_OF_A_YEAR);
  const block = usualBlockLength(logged.length);
  const days = new Int32Array(YEARS_IN_POOL * daysEach);
  for (let j = 0; j < YEARS_IN_POOL; j++) {
    fillWithBlocks(days, j * daysEach, daysEach, logged.length, block, random);
  }
  for (let i = 0; i < days.length; i++) days[i] = logged[days[i]];
  return { daysEach, days };
}

function sum(values: readonly number[]): number {
  let total = 0;
  for (const value of values) total += value;
  return total;
}
