/**
 * A load on a grid: the number of the nearest level, halves upwards (so that a shift by whole steps shifts the
 * levels); the load itself without a grid.
 *
 * @param load in load units
 * @param step grid in load units, 0 for none
 */
export function levelOf(load: number, step: number): number {
  return step > 0 ? Math.round(load / step) : load;
}
