/**
 * The racetrack (hysteresis) filter: turning points of a history with oscillations below a threshold left out,
 * peaks unmoved. The closed four-point cycles of at least the threshold are exactly those of the unfiltered
 * history; counting first and dropping small ranges afterwards (`dropSmallRanges`) needs no filter.
 *
 * The start is symmetric: the running minimum and maximum are followed until they are a threshold apart, and the
 * earlier of the two is the first turning point.
 *
 * @param loads samples in time order, any unit; NaN is a missing sample
 * @param threshold smallest change that counts, same unit; 0 gives the turning points
 * @returns accepted turning points, the last running extreme included; empty when nothing reaches the threshold
 * @example racetrack([0, 1, 0.6, 2, -1, -0.7, -3, 4], 0.5) // 0, 2, -3, 4
 */
export function racetrack(loads: ArrayLike<number>, threshold: number): number[] {
  const points: number[] = [];
  let lowest = Infinity;
  let highest = -Infinity;
  let lowestFirst = false;
  let direction = 0;
  let extreme = 0;
  for (let i = 0; i < loads.length; i++) {
    const load = loads[i];
    if (Number.isNaN(load)) continue;
    if (direction === 0) {
      if (load < lowest) {
        lowest = load;
        lowestFirst = highest === -Infinity;
      }
      if (load > highest) {
        highest = load;
        lowestFirst = lowest !== load;
      }
      if (highest > lowest && highest - lowest >= threshold) {
        points.push(lowestFirst ? lowest : highest);
        direction = lowestFirst ? 1 : -1;
        extreme = lowestFirst ? highest : lowest;
      }
    } else if (direction > 0 ? load >= extreme : load <= extreme) {
      extreme = load;
    } else if (Math.abs(load - extreme) >= threshold) {
      points.push(extreme);
      extreme = load;
      direction = -direction;
    }
  }
  if (direction !== 0) points.push(extreme);
  return points;
}
