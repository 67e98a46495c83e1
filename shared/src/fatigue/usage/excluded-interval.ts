/** What an interval excluded by hand adds to an account. */
export interface ExcludedPosting {
  damage: number;
  /** Where it comes from. */
  basis: 'own-count' | 'band-rate';
  words: string;
}

/**
 * Damage of an interval somebody excluded. Until a second person confirms, the larger of its own count and the rate of
 * its state and wind stands: leaving loads out must not lengthen a life on one person's word. Confirmed, it is unlogged
 * time like any other.
 *
 * @param ownDamage what the excluded loads would have done
 * @param bandDamage its hours at the rate of its state and wind band, see postUnlogged
 * @throws RangeError for negative damages
 */
export function excludedInterval(
  ownDamage: number,
  bandDamage: number,
  confirmedBySecond: boolean,
): ExcludedPosting {
  if (!(ownDamage >= 0 && bandDamage >= 0)) {
    throw new RangeError(`Damages must be zero or more, not ${ownDamage} and ${bandDamage}.`);
  }
  if (confirmedBySecond) {
    return {
      damage: bandDamage,
      basis: 'band-rate',
      words: 'Excluded and confirmed: charged at the rate of its state and wind.',
    };
  }
  return ownDamage > bandDamage
    ? {
        damage: ownDamage,
        basis: 'own-count',
        words: 'Excluded, not yet confirmed by a second person: its own count stands, being the larger.',
      }
    : {
        damage: bandDamage,
        basis: 'band-rate',
        words:
          'Excluded, not yet confirmed by a second person: the rate of its state and wind stands, being the larger.',
      };
}
