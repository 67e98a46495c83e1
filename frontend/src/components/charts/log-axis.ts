export interface LogAxis {
  min: number;
  max: number;
  ticks: number[];
}

/**
 * Ends and ticks of a logarithmic axis: 1, 2 and 5 of each decade over short stretches, the decades alone over long ones.
 * The ends are the ticks that enclose the values.
 *
 * @returns null when there is no value above zero
 */
export function logAxis(values: readonly number[]): LogAxis | null {
  const positive = values.filter((value) => value > 0 && Number.isFinite(value));
  if (positive.length === 0) return null;
  const lowest = Math.min(...positive);
  const highest = Math.max(...positive);
  const firstDecade = Math.floor(Math.log10(lowest));
  const lastDecade = Math.ceil(Math.log10(highest));
  const steps = lastDecade - firstDecade > 3 ? [1] : [1, 2, 5];
  const marks: number[] = [];
  for (let decade = firstDecade; decade <= lastDecade; decade += 1) {
    // Through text: 2e-3 is the double people mean, 2 * 10 ** -3 may be its neighbour.
    for (const step of steps) marks.push(Number(`${step}e${decade}`));
  }
  const slack = 1 + 1e-9;
  const min = marks.filter((mark) => mark <= lowest * slack).at(-1) ?? marks[0];
  const max = marks.find((mark) => mark * slack >= highest && mark > min) ?? marks[marks.length - 1];
  return { min, max, ticks: marks.filter((mark) => mark >= min && mark <= max) };
}
