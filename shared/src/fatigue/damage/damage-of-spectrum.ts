import type { LoadSpectrum } from '../rainflow/load-spectrum.js';
import { CompensatedSum } from './compensated-sum.js';
import { CycleEvaluator } from './cycle-evaluator.js';
import type { DetailModel } from './detail-model.js';
import { type RangeBin, rangeHistogram } from './range-histogram.js';

/** Damage of one day, in the day number of the spectrum (days since 1970-01-01, vessel's zone). */
export interface DayDamage {
  day: number;
  damage: number;
}

/** Damage a load spectrum does to one detail, split in the ways a person asks about. */
export interface SpectrumDamage {
  /** closed + residue. */
  damage: number;
  /** Of closed cycles, each counted as 1. */
  closed: number;
  /** Of successive pairs of the residue, each counted as one half. */
  residue: number;
  /** Ascending; a residue pair belongs to the day of its higher extreme. */
  byDay: DayDamage[];
  /** Largest range taken to the curve, in its measure; 0 for an empty spectrum. */
  largestRange: number;
  /** Cycles larger than the curve's tests support, with their damage; limit null where the source sets none. */
  rangeAboveValidity: { limit: number | null; cycles: number; damage: number };
  /** The cycles against the curve, by range in its measure. */
  histogram: RangeBin[];
}

/** Widest table of damage by range level that is still cheaper than working each cycle out (32 MiB of doubles). */
const MAX_TABLE_LEVELS = 1 << 22;
const HISTOGRAM_BINS = 120;

/**
 * Miner's sum of a load spectrum on a detail: closed cycles count 1, successive residue pairs one half, each by
 * the detail's own curve.
 *
 * Where only the range matters and loads lie on a grid, the curve is evaluated once per distinct range, so that a
 * season answers a new curve in milliseconds.
 *
 * @param spectrum loads in kN (level times step, or raw where step is 0)
 * @param detail what turns the load into the measure of its curve
 * @throws MeanAboveUltimateError when a counted mean reaches the ultimate of the detail's mean rule
 * Source: Palmgren-Miner; residue as ASTM E1049-85 section 5.4.4 (halves).
 */
export function damageOfSpectrum(spectrum: LoadSpectrum, detail: DetailModel): SpectrumDamage {
  const evaluator = new CycleEvaluator(detail);
  const maxLevel = spectrum.step > 0 && evaluator.dependsOnRangeOnly ? levelWidth(spectrum) : Infinity;
  const parts =
    maxLevel <= MAX_TABLE_LEVELS ? byRangeLevel(spectrum, evaluator, maxLevel) : byCycle(spectrum, evaluator);
  return summarise(parts, detail);
}

/** Distinct ranges with their counts and damages, and the damage of each day; the two ways of working fill the same. */
interface Parts {
  ranges: ArrayLike<number>;
  counts: ArrayLike<number>;
  damages: ArrayLike<number>;
  closed: number;
  residue: number;
  byDay: Map<number, number>;
}

/** A width no range exceeds: highest less lowest level. Ranges themselves would cost a pass over three arrays. */
function levelWidth(spectrum: LoadSpectrum): number {
  const { residue } = spectrum;
  let lowest = Infinity;
  let highest = -Infinity;
  for (const { cycles } of spectrum.days) {
    const { low, high } = cycles;
    for (let i = 0; i < low.length; i++) if (low[i] < lowest) lowest = low[i];
    for (let i = 0; i < high.length; i++) if (high[i] > highest) highest = high[i];
  }
  for (let i = 0; i < residue.length; i++) {
    lowest = Math.min(lowest, residue[i]);
    highest = Math.max(highest, residue[i]);
  }
  return highest < lowest ? 0 : highest - lowest;
}

function byRangeLevel(spectrum: LoadSpectrum, evaluator: CycleEvaluator, maxLevel: number): Parts {
  const { days, residue, residueDay, step } = spectrum;
  const rangePerLevel = step * evaluator.rangePerKn;
  // Filled when a level is first met: a wide grid is used in few of its levels.
  const damagePerCycle = new Float64Array(maxLevel + 1).fill(NaN);
  const damageAt = (level: number): number => {
    const known = damagePerCycle[level];
    return known === known
      ? known
      : (damagePerCycle[level] = evaluator.damageOf(level * rangePerLevel, 0, 0));
  };

  const closedCounts = new Float64Array(maxLevel + 1);
  const byDay = new Map<number, number>();
  for (const { day, cycles } of days) {
    const { low, high, count } = cycles;
    let damage = 0;
    for (let i = 0; i < low.length; i++) {
      const level = high[i] - low[i];
      closedCounts[level] += count[i];
      damage += count[i] * damageAt(level);
    }
    addToDay(byDay, day, damage);
  }
  const residueCounts = new Float64Array(maxLevel + 1);
  for (let i = 1; i < residue.length; i++) {
    const level = Math.abs(residue[i] - residue[i - 1]);
    residueCounts[level] += 0.5;
    addToDay(byDay, residueDay[residue[i] > residue[i - 1] ? i : i - 1], 0.5 * damageAt(level));
  }

  const ranges: number[] = [];
  const counts: number[] = [];
  const damages: number[] = [];
  const closed = new CompensatedSum();
  const open = new CompensatedSum();
  for (let level = 0; level <= maxLevel; level++) {
    const count = closedCounts[level] + residueCounts[level];
    if (count === 0) continue;
    const perCycle = damagePerCycle[level];
    ranges.push(level * rangePerLevel);
    counts.push(count);
    damages.push(count * perCycle);
    closed.add(closedCounts[level] * perCycle);
    open.add(residueCounts[level] * perCycle);
  }
  return { ranges, counts, damages, closed: closed.value, residue: open.value, byDay };
}

function byCycle(spectrum: LoadSpectrum, evaluator: CycleEvaluator): Parts {
  const { days, residue, residueDay } = spectrum;
  const kn = spectrum.step > 0 ? spectrum.step : 1;
  let size = Math.max(residue.length - 1, 0);
  for (const { cycles } of days) size += cycles.low.length;
  const ranges = new Float64Array(size);
  const counts = new Float64Array(size);
  const damages = new Float64Array(size);
  const byDay = new Map<number, number>();
  let at = 0;
  const take = (low: number, high: number, count: number): number => {
    const range = evaluator.rangeOf(low * kn, high * kn);
    const damage = count * evaluator.damageOf(range, low * kn, high * kn);
    ranges[at] = range;
    counts[at] = count;
    damages[at++] = damage;
    return damage;
  };
  const closed = new CompensatedSum();
  for (const { day, cycles } of days) {
    const { low, high, count } = cycles;
    const ofDay = new CompensatedSum();
    for (let i = 0; i < low.length; i++) ofDay.add(take(low[i], high[i], count[i]));
    closed.add(ofDay.value);
    addToDay(byDay, day, ofDay.value);
  }
  const open = new CompensatedSum();
  for (let i = 1; i < residue.length; i++) {
    const rises = residue[i] > residue[i - 1];
    const damage = rises ? take(residue[i - 1], residue[i], 0.5) : take(residue[i], residue[i - 1], 0.5);
    open.add(damage);
    addToDay(byDay, residueDay[rises ? i : i - 1], damage);
  }
  return { ranges, counts, damages, closed: closed.value, residue: open.value, byDay };
}

function addToDay(byDay: Map<number, number>, day: number, damage: number): void {
  byDay.set(day, (byDay.get(day) ?? 0) + damage);
}

function summarise(parts: Parts, detail: DetailModel): SpectrumDamage {
  const { ranges, counts, damages, closed, residue } = parts;
  const limit = 'validity' in detail.curve ? detail.curve.validity.maxRange : null;
  let largestRange = 0;
  let cycles = 0;
  const above = new CompensatedSum();
  for (let i = 0; i < ranges.length; i++) {
    if (ranges[i] > largestRange) largestRange = ranges[i];
    if (limit !== null && ranges[i] > limit) {
      cycles += counts[i];
      above.add(damages[i]);
    }
  }
  return {
    damage: closed + residue,
    closed,
    residue,
    byDay: [...parts.byDay].sort(([a], [b]) => a - b).map(([day, damage]) => ({ day, damage })),
    largestRange,
    rangeAboveValidity: { limit, cycles, damage: above.value },
    histogram: rangeHistogram(ranges, counts, damages, largestRange, HISTOGRAM_BINS),
  };
}
