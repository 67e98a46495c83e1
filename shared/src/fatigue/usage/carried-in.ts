/** Spread of what a part carried before its first log. Engineering estimate without a source. */
export const CARRIED_IN_COV = 0.5;

/** What a part carried before its first log. */
export interface CarriedIn {
  damage: number;
  cov: number;
  words: string;
}

/**
 * Damage carried in: sailing hours before the first log times the part's own recorded rate, doubted by half.
 *
 * @param hours before the first log; null: nobody knows, and the part cannot be assessed
 * @param damagePerSailingHour recorded since; null: no log yet, and there is no rate
 * @returns null where hours or rate are not known
 * @throws RangeError for negative figures
 */
export function carriedIn(hours: number | null, damagePerSailingHour: number | null): CarriedIn | null {
  if (hours === null || damagePerSailingHour === null) return null;
  if (!(hours >= 0 && damagePerSailingHour >= 0)) {
    throw new RangeError(`Hours and rate must be zero or more, not ${hours} and ${damagePerSailingHour}.`);
  }
  return {
    damage: hours * damagePerSailingHour,
    cov: hours === 0 ? 0 : CARRIED_IN_COV,
    words:
      hours === 0
        ? 'The part was new at its first log.'
        : `${Number(hours.toPrecision(3))} h before the first log, at the rate recorded since; it may be off by half.`,
  };
}
