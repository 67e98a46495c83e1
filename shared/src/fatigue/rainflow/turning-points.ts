/**
 * The turning points of a load history: its local extremes, with the first and the last sample.
 *
 * A sample equal to the one before it is dropped, a sample that carries on in the same direction is dropped,
 * missing samples (NaN) are dropped before both. Comparison is exact.
 *
 * @param loads samples in time order, any unit
 * @returns strictly alternating extremes in the same unit; one point for a constant history, none for none
 * @example turningPoints([0, 0, 3, 3, 3, 1, 1, 4, 4, 0]) // 0, 3, 1, 4, 0
 */
export function turningPoints(loads: ArrayLike<number>): Float64Array {
  const points = new Float64Array(loads.length);
  let size = 0;
  for (let i = 0; i < loads.length; i++) {
    const load = loads[i];
    if (Number.isNaN(load)) continue;
    if (size > 0 && load === points[size - 1]) continue;
    const carriesOn = size > 1 && load > points[size - 1] === points[size - 1] > points[size - 2];
    if (carriesOn) size--;
    points[size++] = load;
  }
  return points.slice(0, size);
}
