const TOLERANCE_YEARS = 0.25 / 365.25;
/** Beyond some years a day more or less has no meaning. */
const RELATIVE_TOLERANCE = 1e-4;

/**
 * Years at which something that never falls reaches a level: doubling until it is passed, then false position with
 * halving of the side that stands still (the Illinois rule, from memory).
 *
 * @param at the quantity some years from today
 * @returns 0 when it is reached today, Infinity when not within the horizon
 */
export function yearsToLevel(at: (years: number) => number, level: number, mostYears: number): number {
  let low = 0;
  let atLow = at(0) - level;
  if (atLow >= 0) return 0;
  let high = Math.min(1, mostYears);
  let atHigh = at(high) - level;
  while (atHigh < 0) {
    if (high >= mostYears) return Infinity;
    low = high;
    atLow = atHigh;
    high = Math.min(2 * high, mostYears);
    atHigh = at(high) - level;
  }
  let lastSide = 0;
  for (let step = 1; high - low > Math.max(TOLERANCE_YEARS, RELATIVE_TOLERANCE * high); step++) {
    const crossing = (low * atHigh - high * atLow) / (atHigh - atLow);
    // Every third step halves, so that a quantity which jumps is found as well.
    const middle = step % 3 !== 0 && crossing > low && crossing < high ? crossing : (low + high) / 2;
    const atMiddle = at(middle) - level;
    if (atMiddle >= 0) {
      high = middle;
      atHigh = atMiddle;
      if (lastSide > 0) atLow /= 2;
      lastSide = 1;
    } else {
      low = middle;
      atLow = atMiddle;
      if (lastSide < 0) atHigh /= 2;
      lastSide = -1;
    }
  }
  return low;
}
