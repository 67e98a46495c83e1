/**
 * Value below which a share of sorted numbers lies, in a straight line between neighbours; infinities stay whole.
 *
 * @param sorted ascending, at least one
 * @param share 0 to 1
 */
export function quantileOfSorted(sorted: ArrayLike<number>, share: number): number {
  const at = share * (sorted.length - 1);
  const below = Math.floor(at);
  const low = sorted[below];
  const high = sorted[Math.min(below + 1, sorted.length - 1)];
  return at === below || low === high ? low : low + (high - low) * (at - below);
}
