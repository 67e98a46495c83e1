import type { LoadSpectrum } from '@stayledger/shared/fatigue/rainflow/load-spectrum';

/** Where a position has no part yet, kN: fine enough for the smallest yacht. */
const STEP_WITHOUT_PART_KN = 0.005;
/** The grid is at least so fine against the breaking load; twice as fine as the coarsest that is allowed. */
const STEPS_PER_BREAKING_LOAD = 4000;

/**
 * Grid the loads of a channel are rounded to, kN: the largest of 1, 2 or 5 times a power of ten that divides the
 * lowest breaking load the channel serves into 4,000 steps or more. Decimal recordings fall on it exactly.
 *
 * @param breakingLoadsKn of the parts in the channel's position
 */
export function countingStepKn(breakingLoadsKn: readonly number[]): number {
  if (breakingLoadsKn.length === 0) return STEP_WITHOUT_PART_KN;
  const limit = Math.min(...breakingLoadsKn) / STEPS_PER_BREAKING_LOAD;
  const power = Math.floor(Math.log10(limit));
  const digit = [5, 2, 1].find((candidate) => Number(`${candidate}e${power}`) <= limit);
  // A limit that is just a power of ten may come out one power too high in floating point.
  return digit === undefined ? Number(`5e${power - 1}`) : Number(`${digit}e${power}`);
}

/**
 * How much rounding to the grid can have changed the damage, as a share of it, estimated from the counted cycles:
 * a rounded extreme is off by up to half a step, evenly, so a range R has a variance of step^2 / 6, and its m-th power
 * grows on average by m (m - 1) / 2 * step^2 / 6 / R^2. First order; ranges of a few steps weigh next to nothing.
 *
 * @param slope m of the steepest segment the cycles meet
 */
export function roundingShare(spectrum: LoadSpectrum, slope: number): number {
  if (spectrum.step === 0) return 0;
  let damage = 0;
  let change = 0;
  const take = (range: number, count: number) => {
    damage += count * range ** slope;
    change += (count * range ** (slope - 2) * slope * (slope - 1)) / 12;
  };
  for (const { cycles } of spectrum.days) {
    cycles.low.forEach((low, i) => take(cycles.high[i] - low, cycles.count[i]));
  }
  for (let i = 1; i < spectrum.residue.length; i++) {
    take(Math.abs(spectrum.residue[i] - spectrum.residue[i - 1]), 0.5);
  }
  return damage === 0 ? 0 : change / damage;
}
