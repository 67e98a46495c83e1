import { normalSource } from '../statistics/normal-source.js';
import { answeringGroups } from '../usage/answering-groups.js';
import type { UsageGroup, UsageState } from '../usage/usage-state.js';
import { damageUnderSail, hoursUnderSail } from './days-under-sail.js';
import { damageOnGrid, GRID_SIZE, lnNode } from './damage-on-grid.js';
import { type LifeDraws, lnFactors, type YearPool, YEARS_IN_POOL } from './life-draws.js';
import type { DetailRecord, PartRecord, UseRecord } from './life-record.js';
import { rateDoubt } from './rate-doubt.js';

/** What makes the damage of a life doubtful; the curve and the Miner sum act on the failure, not on the damage. */
export type DamageDoubt =
  'gain' | 'basis' | 'stress' | 'sampling' | 'days' | 'seasons' | 'unlogged' | 'carried-in';

/** All of them, as they act on the reliability date. */
export const ALL_DAMAGE_DOUBTS: ReadonlySet<DamageDoubt> = new Set([
  'gain',
  'basis',
  'stress',
  'sampling',
  'days',
  'seasons',
  'unlogged',
  'carried-in',
]);

/** Damage of one detail on its mean curve in every draw, today and at the end of every coming year. */
export interface DamagePaths {
  draws: number;
  years: number;
  /** Draw i at the end of year k: cumulative[i * (years + 1) + k]; k = 0 is today. */
  cumulative: Float64Array;
}

/**
 * Damage of a detail through its life, once per draw: what its logs recorded at that draw's gain and stress, what its
 * unlogged hours and the time before its first log add, and year by year what the plan will add.
 *
 * Rates are per group of state and wind; a draw weighs them by the planned hours of each state and by the share of
 * each wind band in its own resample of the days, so that a record with wind gains from unlogged days too. How sure a
 * rate from few days is, see rateDoubt.
 *
 * @param draws shared draws of the vessel
 * @param doubts which doubts act; the others stand at their central values
 * @returns damage on the mean curve, without scatter of the curve
 * @throws RangeError where grid, days and calibration periods do not fit together
 */
export function damagePaths(
  draws: LifeDraws,
  part: Pick<PartRecord, 'key' | 'basisCov' | 'carriedInHours'>,
  detail: DetailRecord,
  doubts: ReadonlySet<DamageDoubt> = ALL_DAMAGE_DOUBTS,
): DamagePaths {
  const { use, draws: count, years, streams } = draws;
  const record = new RateRecord(use, detail);
  const hoursWanted = wantedHours(use, part.carriedInHours);
  const central = hoursWanted.map((wanted) => record.centralSums(wanted));
  const posted = record.postedSums();
  const own = `${part.key}/${detail.key}`;
  const lnBasis = doubts.has('basis') ? lnFactors(count, part.basisCov, streams(`basis ${part.key}`)) : null;
  const lnStress = doubts.has('stress') ? lnFactors(count, detail.stressCov, streams(`stress ${own}`)) : null;
  const normal = normalSource(streams(`sampling ${part.key}`));
  const doubt = rateDoubt(draws, detail);
  const yearRatios = record.poolRatios(draws.yearPool);
  const unloggedRatios = record.poolRatios(draws.unloggedPool);

  const cumulative = new Float64Array(count * (years + 1));
  const lnFactor = new Float64Array(use.calibrations.length);
  for (let i = 0; i < count; i++) {
    const stress = lnStress === null ? 0 : lnStress[i];
    for (let c = 0; c < lnFactor.length; c++) {
      const gain = (doubts.has('gain') ? draws.lnGains[c][i] : 0) + (lnBasis === null ? 0 : lnBasis[i]);
      lnFactor[c] = record.lnRangeOfGain(gain) + stress;
    }
    const sampling =
      detail.sampling.factor *
      (doubts.has('sampling') && detail.sampling.lnSd > 0 ? Math.exp(detail.sampling.lnSd * normal()) : 1);
    const seasons = doubts.has('seasons') ? draws.recordedSeasons[i] : 1;

    const rates = central.map((sums) => record.damage(sums, lnFactor));
    if (doubts.has('days')) {
      record.resample(draws.resampledDays, i * use.days.length, lnFactor);
      for (let k = 0; k < rates.length; k++) {
        if (rates[k] === 0) continue;
        const redrawn = record.damage(record.resampledSums(hoursWanted[k]), lnFactor);
        if (redrawn > 0) rates[k] *= doubt.worseDays * (rates[k] / redrawn) ** doubt.widening[i];
      }
    }
    const [planned, unlogged, carriedIn] = rates;
    let damage = record.damage(posted, lnFactor);
    damage += unlogged * (doubts.has('unlogged') ? unloggedRatios[draws.unloggedPicks[i]] : 1);
    damage += (carriedIn * (doubts.has('carried-in') ? draws.carriedIn[i] : 1)) / seasons;
    const start = i * (years + 1);
    cumulative[start] = damage * sampling;
    const perYear = (planned * sampling) / seasons;
    for (let year = 0; year < years; year++) {
      const at = i * years + year;
      const season = doubts.has('seasons') ? draws.comingSeasons[at] : 1;
      const weather = doubts.has('days') ? yearRatios[draws.yearPicks[at]] : 1;
      cumulative[start + year + 1] = cumulative[start + year] + perYear * season * weather;
    }
  }
  return { draws: count, years, cumulative };
}

/** Hours by group that a rate is wanted for, and how a resample changes the share of each wind band. */
interface WantedHours {
  /** Hours by state, split over its wind bands as the days fall; null where the hours of each group are known. */
  byState: ReadonlyMap<UsageState, number> | null;
  byGroup: readonly number[] | null;
}

function wantedHours(use: UseRecord, carriedInHours: number): WantedHours[] {
  const planned = new Map(Object.entries(use.plannedHoursPerYear) as [UsageState, number][]);
  const unlogged = use.groups.map(
    (_, group) =>
      (use.otherUnloggedHours[group] ?? 0) +
      use.days.reduce((sum, day) => sum + (day.unloggedHours[group] ?? 0), 0),
  );
  return [
    { byState: planned, byGroup: null },
    { byState: null, byGroup: unlogged },
    { byState: new Map([['sailing', carriedInHours]]), byGroup: null },
  ];
}

/** The record of one detail, laid out for resampling; holds the working arrays of one draw. */
class RateRecord {
  private readonly groups: readonly UsageGroup[];
  private readonly calibrations: number;
  private readonly daysLogged: Float64Array;
  private readonly daysKnown: Float64Array;
  /** The cells of day d are those from cellStart[d] to cellStart[d + 1]: where their sums go, and their damage by node. */
  private readonly cellStart: Int32Array;
  private readonly cellTarget: Int32Array;
  private readonly cellDamage: Float64Array;
  private readonly grid: Float64Array;
  private readonly lnStep: number;
  /** By group: logged hours, all known hours, and damage by calibration and grid node. */
  private readonly whole: GroupSums;
  /** The groups whose record answers for each group. */
  private readonly answering: number[][];
  private readonly drawn: GroupSums;

  constructor(
    private readonly use: UseRecord,
    private readonly detail: DetailRecord,
  ) {
    const { days, groups, calibrations } = use;
    if (
      detail.grid.byDay.length !== days.length * GRID_SIZE ||
      detail.calibrationOfDay.length !== days.length
    ) {
      throw new RangeError(`The record of the ${detail.name} does not have a row for each day.`);
    }
    if (detail.calibrationOfDay.some((index) => !(index >= 0 && index < calibrations.length))) {
      throw new RangeError(`The record of the ${detail.name} names a calibration period that is not there.`);
    }
    this.groups = groups;
    this.calibrations = calibrations.length;
    this.grid = detail.grid.byDay;
    this.lnStep = detail.grid.lnStep;
    const cells = [...detail.shares].sort((one, other) => one.day - other.day);
    this.cellStart = new Int32Array(days.length + 1);
    this.cellTarget = new Int32Array(cells.length);
    this.cellDamage = new Float64Array(cells.length * GRID_SIZE);
    cells.forEach(({ day, group, share }, cell) => {
      this.cellStart[day + 1] = cell + 1;
      this.cellTarget[cell] = (group * this.calibrations + detail.calibrationOfDay[day]) * GRID_SIZE;
      for (let i = 0; i < GRID_SIZE; i++) {
        this.cellDamage[cell * GRID_SIZE + i] = share * this.grid[day * GRID_SIZE + i];
      }
    });
    for (let day = 0; day < days.length; day++) {
      this.cellStart[day + 1] = Math.max(this.cellStart[day + 1], this.cellStart[day]);
    }
    const size = groups.length;
    this.daysLogged = new Float64Array(days.length * size);
    this.daysKnown = new Float64Array(days.length * size);
    days.forEach((day, index) => {
      for (let g = 0; g < size; g++) {
        this.daysLogged[index * size + g] = day.loggedHours[g] ?? 0;
        this.daysKnown[index * size + g] = (day.loggedHours[g] ?? 0) + (day.unloggedHours[g] ?? 0);
      }
    });
    this.whole = new GroupSums(size, this.calibrations);
    this.drawn = new GroupSums(size, this.calibrations);
    for (let day = 0; day < days.length; day++) this.addDay(this.whole, day, 0, GRID_SIZE);
    this.answering = answeringGroups(groups, this.whole.logged);
  }

  /** Logarithm of the factor on the range that a factor on the load stands for. */
  lnRangeOfGain(lnGain: number): number {
    const nodes = this.detail.grid.lnRangeOfGain;
    const at = lnGain / this.lnStep + (GRID_SIZE - 1) / 2;
    const below = Math.min(Math.max(Math.floor(at), 0), GRID_SIZE - 2);
    const share = (lnGain - lnNode(below, this.lnStep)) / this.lnStep;
    return nodes[below] + (nodes[below + 1] - nodes[below]) * share;
  }

  /** Damage of sums per calibration period, each at its own factor. */
  damage(sums: Float64Array, lnFactor: Float64Array): number {
    let damage = 0;
    for (let c = 0; c < lnFactor.length; c++) {
      damage += damageOnGrid(sums, c * GRID_SIZE, this.lnStep, lnFactor[c]);
    }
    return damage;
  }

  /** What counts towards the account of the part. */
  postedSums(): Float64Array {
    const { posted, calibrationOfDay } = this.detail;
    const sums = new Float64Array(this.calibrations * GRID_SIZE);
    for (let day = 0; day < calibrationOfDay.length; day++) {
      if (posted !== undefined && !posted[day]) continue;
      for (let i = 0; i < GRID_SIZE; i++) {
        sums[calibrationOfDay[day] * GRID_SIZE + i] += this.grid[day * GRID_SIZE + i];
      }
    }
    return sums;
  }

  centralSums(wanted: WantedHours): Float64Array {
    return this.sumsFor(wanted, this.whole);
  }

  /** Adds up the days of a draw, at the nodes its factors lie between. */
  resample(resampledDays: Int32Array, offset: number, lnFactor: Float64Array): void {
    const last = GRID_SIZE - 4;
    let first = last;
    let end = 0;
    for (const factor of lnFactor) {
      const below = Math.floor(factor / this.lnStep) + (GRID_SIZE - 1) / 2 - 1;
      first = Math.min(first, Math.max(below, 0));
      end = Math.max(end, Math.min(below, last) + 4);
    }
    this.drawn.clear();
    const days = this.use.days.length;
    for (let i = offset; i < offset + days; i++) this.addDay(this.drawn, resampledDays[i], first, end);
  }

  resampledSums(wanted: WantedHours): Float64Array {
    return this.sumsFor(wanted, this.drawn);
  }

  /** Damage per hour under sail of each year of a pool over that of the whole record, at the recorded gain. */
  poolRatios(pool: YearPool | null): Float64Array {
    const ratios = new Float64Array(YEARS_IN_POOL).fill(1);
    if (pool === null) return ratios;
    const hours = hoursUnderSail(this.use);
    const damage = damageUnderSail(this.use, this.detail);
    const allHours = hours.reduce((sum, part) => sum + part, 0);
    const allDamage = damage.reduce((sum, part) => sum + part, 0);
    if (allDamage === 0) return ratios;
    for (let j = 0; j < YEARS_IN_POOL; j++) {
      let ofYear = 0;
      let time = 0;
      for (let i = j * pool.daysEach; i < (j + 1) * pool.daysEach; i++) {
        ofYear += damage[pool.days[i]];
        time += hours[pool.days[i]];
      }
      ratios[j] = (ofYear * allHours) / (time * allDamage);
    }
    return ratios;
  }

  private addDay(sums: GroupSums, day: number, firstNode: number, endNode: number): void {
    const { daysLogged, daysKnown, cellStart, cellTarget, cellDamage } = this;
    const { logged, known, damage } = sums;
    const groups = logged.length;
    const nodes = GRID_SIZE;
    for (let g = 0, from = day * groups; g < groups; g++, from++) {
      logged[g] += daysLogged[from];
      known[g] += daysKnown[from];
    }
    for (let cell = cellStart[day]; cell < cellStart[day + 1]; cell++) {
      const to = cellTarget[cell];
      const from = cell * nodes;
      for (let i = firstNode; i < endNode; i++) damage[to + i] += cellDamage[from + i];
    }
  }

  /** Damage of the wanted hours by calibration and node: hours times damage per hour, group by group. */
  private sumsFor(wanted: WantedHours, from: GroupSums): Float64Array {
    const width = this.calibrations * GRID_SIZE;
    const sums = new Float64Array(width);
    for (let g = 0; g < this.groups.length; g++) {
      const hours = wanted.byGroup === null ? this.hoursOfGroup(wanted, g, from) : wanted.byGroup[g];
      const answering = this.answering[g];
      if (hours === 0 || answering.length === 0) continue;
      // A band that a resample happens to miss keeps its recorded rate.
      const source = sumOver(from.logged, answering) > 0 ? from : this.whole;
      const weight = hours / sumOver(source.logged, answering);
      for (const group of answering) {
        for (let i = 0; i < width; i++) sums[i] += weight * source.damage[group * width + i];
      }
    }
    return sums;
  }

  private hoursOfGroup(wanted: WantedHours, group: number, from: GroupSums): number {
    const { state } = this.groups[group];
    const hours = wanted.byState?.get(state) ?? 0;
    if (hours === 0) return 0;
    const drawn = this.knownHours(state, from);
    if (drawn > 0) return (hours * (from.known[group] + this.otherHours(group))) / drawn;
    const recorded = this.knownHours(state, this.whole);
    return recorded > 0 ? (hours * this.whole.known[group]) / recorded : 0;
  }

  private knownHours(state: UsageState, sums: GroupSums): number {
    let hours = 0;
    for (let g = 0; g < this.groups.length; g++) {
      if (this.groups[g].state === state) hours += sums.known[g] + this.otherHours(g);
    }
    return hours;
  }

  private otherHours(group: number): number {
    return this.use.otherUnloggedHours[group] ?? 0;
  }
}

function sumOver(values: Float64Array, indices: readonly number[]): number {
  let sum = 0;
  for (const index of indices) sum += values[index];
  return sum;
}

class GroupSums {
  readonly logged: Float64Array;
  readonly known: Float64Array;
  readonly damage: Float64Array;

  constructor(groups: number, calibrations: number) {
    this.logged = new Float64Array(groups);
    this.known = new Float64Array(groups);
    this.damage = new Float64Array(groups * calibrations * GRID_SIZE);
  }

  clear(): void {
    this.logged.fill(0);
    this.known.fill(0);
    this.damage.fill(0);
  }
}
