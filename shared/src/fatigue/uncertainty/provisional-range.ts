/** An input nobody has confirmed, and what the date would be at the ends of what it may plausibly be. */
export interface UnconfirmedEstimate {
  /** Stable name of the input: "lower terminal: articulation". */
  input: string;
  /** What a surveyor would confirm, in words. */
  words: string;
  /** True once a surveyor has confirmed it, with evidence. */
  confirmed: boolean;
  /** Remaining years at the two ends of its plausible values, in any order. */
  remainingYears: readonly [number, number];
}

/** A date that hangs on an estimate. */
export interface ProvisionalRange {
  provisional: boolean;
  /** Remaining years from and to; both the central figure where nothing makes it provisional. */
  fromYears: number;
  toYears: number;
  /** The inputs that cause it, the one with the largest factor first. */
  causes: { input: string; words: string; factor: number }[];
}

/** A date is provisional while one unconfirmed estimate moves it by more than this factor. Engineering choice. */
export const PROVISIONAL_FACTOR = 3;

/**
 * Whether a date hangs on an unconfirmed estimate: any such input that alone moves the remaining time by more than a
 * factor 3, up or down. Such a date is a range with its cause; it is never called overdue and asks for an inspection
 * instead of a replacement.
 *
 * @param remainingYears central figure, zero or more
 * @throws RangeError for negative times
 */
export function provisionalRange(
  remainingYears: number,
  estimates: readonly UnconfirmedEstimate[],
): ProvisionalRange {
  requireTime(remainingYears);
  const causes: (ProvisionalRange['causes'][number] & { low: number; high: number })[] = [];
  for (const { input, words, confirmed, remainingYears: ends } of estimates) {
    ends.forEach(requireTime);
    if (confirmed) continue;
    const low = Math.min(remainingYears, ...ends);
    const high = Math.max(remainingYears, ...ends);
    const factor = Math.max(ratio(remainingYears, low), ratio(high, remainingYears));
    if (factor > PROVISIONAL_FACTOR) causes.push({ input, words, factor, low, high });
  }
  causes.sort((one, other) => other.factor - one.factor);
  return {
    provisional: causes.length > 0,
    fromYears: Math.min(remainingYears, ...causes.map(({ low }) => low)),
    toYears: Math.max(remainingYears, ...causes.map(({ high }) => high)),
    causes: causes.map(({ input, words, factor }) => ({ input, words, factor })),
  };
}

/** No time at all both ways is no movement; from nothing to something is any factor. */
function ratio(more: number, less: number): number {
  return more === less ? 1 : more / less;
}

function requireTime(years: number): void {
  if (!(years >= 0)) throw new RangeError(`A remaining time must be zero or more, not ${years}.`);
}
