/** Share of the characteristic failure stress that class guidance permits in metal standing rigging. */
export const PERMISSIBLE_SHARE = { sailing: 0.53, survival: 0.68 } as const;

/**
 * Safety factor that a permissible share of the strength stands for: its inverse.
 *
 * @param share above 0, at most 1
 * @throws RangeError outside that
 * Source of the shares: class guidance notes for masts, spars and standing rigging (January 2017), Table 1.7.1 (published).
 */
export function safetyFactorOfShare(share: number): number {
  if (!(share > 0 && share <= 1))
    throw new RangeError(`A share must lie above 0 and at most 1, not ${share}.`);
  return 1 / share;
}
