/** A residue with the days of its points, and the cycles that closed while it was reduced. */
export interface ReducedResidue {
  residue: Float64Array;
  residueDay: Int32Array;
  low: number[];
  high: number[];
  day: number[];
  /** Turning points of the list that was reduced. */
  turningPoints: number;
}

/**
 * Turning points of a list of loads with days, then the four-point rule with equal loads ordered by time
 * (the later one is the higher), as every spectrum keeps it.
 *
 * @param loads levels or loads in time order, for example the residues of neighbouring stretches in a row
 * @param days day of each of them
 */
export function reduceResidue(loads: Float64Array, days: Int32Array): ReducedResidue {
  const point = new Float64Array(loads.length);
  const pointDay = new Int32Array(loads.length);
  let size = 0;
  for (let i = 0; i < loads.length; i++) {
    const load = loads[i];
    // A plateau is one point and takes the day it began.
    if (size > 0 && load === point[size - 1]) continue;
    if (size > 1 && load > point[size - 1] === point[size - 1] > point[size - 2]) size--;
    point[size] = load;
    pointDay[size++] = days[i];
  }
  const turningPoints = size;
  const low: number[] = [];
  const high: number[] = [];
  const day: number[] = [];
  let top = 0;
  for (let i = 0; i < turningPoints; i++) {
    // The stack never outgrows what has been read, so it may live in the front of the same arrays.
    point[top] = point[i];
    pointDay[top++] = pointDay[i];
    while (top >= 4) {
      const a = point[top - 4];
      const b = point[top - 3];
      const c = point[top - 2];
      const d = point[top - 1];
      if (b > c) {
        if (c < a || b > d) break;
        low.push(c);
        high.push(b);
        day.push(pointDay[top - 3]);
      } else {
        if (c >= a || b <= d) break;
        low.push(b);
        high.push(c);
        day.push(pointDay[top - 2]);
      }
      point[top - 3] = d;
      pointDay[top - 3] = pointDay[top - 1];
      top -= 2;
    }
  }
  return {
    residue: point.slice(0, top),
    residueDay: pointDay.slice(0, top),
    low,
    high,
    day,
    turningPoints,
  };
}
