/** A load as it was recorded with the wind of its moment. */
export interface WindObservation {
  /** Apparent wind speed, knots. */
  windKn: number;
  /** Apparent wind angle from the bow, degrees; the side does not matter. */
  angleDeg: number;
  loadKn: number;
  /** Time it stands for, hours. */
  hours: number;
}

/** How bins are cut. */
export interface WindBins {
  /** Lowest speed of each bin, knots, ascending; the last one is open. */
  speedsKn: readonly number[];
  /** Lowest angle of each bin, degrees, ascending within 0 to 180; the last one ends at 180. */
  anglesDeg: readonly number[];
}

/** Loads recorded in one bin of apparent wind. */
export interface WindBin {
  fromKn: number;
  /** Null: open upwards. */
  toKn: number | null;
  fromDeg: number;
  toDeg: number;
  hours: number;
  /** Null where there is too little record. */
  loads: { medianKn: number; p95Kn: number; maxKn: number } | null;
  /** What was recorded, in words; never a limit to sail to. */
  words: string;
}

/** Usual bins: five knots, thirty degrees. */
export const USUAL_WIND_BINS: WindBins = {
  speedsKn: [0, 5, 10, 15, 20, 25, 30, 35],
  anglesDeg: [0, 30, 60, 90, 120, 150],
};
/** Less record than this in a bin is not shown. Engineering choice. */
export const LEAST_BIN_HOURS = 2;

/**
 * Loads against apparent wind: hours, median, 95th percentile and maximum per bin of speed and angle, each weighted by
 * time. It says what was recorded. A bin with under two hours keeps its hours and withholds its loads.
 *
 * @param observations any order
 * @returns bins with hours, by speed and then angle; empty ones are left out
 * @throws RangeError for negative speeds or hours, or bins that do not ascend from zero
 */
export function loadAgainstWind(
  observations: readonly WindObservation[],
  bins: WindBins = USUAL_WIND_BINS,
): WindBin[] {
  requireAscending(bins.speedsKn, 'Speeds');
  requireAscending(bins.anglesDeg, 'Angles');
  const columns = bins.anglesDeg.length;
  const byBin = new Map<number, WindObservation[]>();
  for (const observation of observations) {
    const { windKn, angleDeg, hours } = observation;
    if (!(windKn >= 0 && hours >= 0)) {
      throw new RangeError(`Wind and hours must be zero or more, not ${windKn} and ${hours}.`);
    }
    if (hours === 0) continue;
    const index = binOf(windKn, bins.speedsKn) * columns + binOf(fromBow(angleDeg), bins.anglesDeg);
    const known = byBin.get(index);
    if (known === undefined) byBin.set(index, [observation]);
    else known.push(observation);
  }
  return [...byBin]
    .sort(([one], [other]) => one - other)
    .map(([index, own]) => describeBin(own, bins, Math.floor(index / columns), index % columns));
}

/** The wind at which loads pass a chosen working load. */
export interface WorkingLoadCrossing {
  /** Lowest speed of the first bin whose 95th percentile is above the working load, knots; null: none is. */
  fromKn: number | null;
  /** Highest speed that was recorded long enough to say so, knots; null where the last such bin is open. */
  recordedToKn: number | null;
}

/**
 * Where the 95th percentile of the recorded loads passes a working load, over all angles, beside the vessel's own
 * reefing guide. Nothing is said about winds that were not recorded.
 *
 * @param workingLoadKn above zero
 * @returns null where no bin has enough record
 * @throws RangeError for a working load that is not above zero
 */
export function workingLoadCrossing(
  observations: readonly WindObservation[],
  workingLoadKn: number,
  speedsKn: readonly number[] = USUAL_WIND_BINS.speedsKn,
): WorkingLoadCrossing | null {
  if (!(workingLoadKn > 0)) throw new RangeError(`A working load must be above zero, not ${workingLoadKn}.`);
  const shown = loadAgainstWind(observations, { speedsKn, anglesDeg: [0] }).filter(
    ({ loads }) => loads !== null,
  );
  const last = shown.at(-1);
  if (last === undefined) return null;
  const passing = shown.find(({ loads }) => loads !== null && loads.p95Kn > workingLoadKn);
  return { fromKn: passing?.fromKn ?? null, recordedToKn: last.toKn };
}

function describeBin(own: WindObservation[], bins: WindBins, row: number, column: number): WindBin {
  const hours = own.reduce((sum, observation) => sum + observation.hours, 0);
  const fromKn = bins.speedsKn[row];
  const toKn = bins.speedsKn.at(row + 1) ?? null;
  const bin = {
    fromKn,
    toKn,
    fromDeg: bins.anglesDeg[column],
    toDeg: bins.anglesDeg.at(column + 1) ?? 180,
    hours,
  };
  const span = toKn === null ? `over ${fromKn} kn` : `${fromKn} to ${toKn} kn`;
  if (hours < LEAST_BIN_HOURS) {
    return {
      ...bin,
      loads: null,
      words: `Under ${LEAST_BIN_HOURS} h were recorded at ${span}: nothing is shown.`,
    };
  }
  const sorted = [...own].sort((one, other) => one.loadKn - other.loadKn);
  const loads = {
    medianKn: loadBelowWhich(sorted, 0.5 * hours),
    p95Kn: loadBelowWhich(sorted, 0.95 * hours),
    maxKn: sorted[sorted.length - 1].loadKn,
  };
  return {
    ...bin,
    loads,
    words: `In ${short(hours)} h at ${span}, 95 % of loads were below ${short(loads.p95Kn)} kN.`,
  };
}

/** The load up to which so many hours lie. */
function loadBelowWhich(sorted: readonly WindObservation[], hours: number): number {
  let passed = 0;
  for (const { loadKn, hours: own } of sorted) {
    passed += own;
    if (passed >= hours * (1 - 1e-12)) return loadKn;
  }
  return sorted[sorted.length - 1].loadKn;
}

function binOf(value: number, bounds: readonly number[]): number {
  let bin = 0;
  while (bin + 1 < bounds.length && value >= bounds[bin + 1]) bin++;
  return bin;
}

/** Degrees from the bow, 0 to 180, whatever the side and however the angle is counted. */
function fromBow(angleDeg: number): number {
  const turned = ((angleDeg % 360) + 360) % 360;
  return turned > 180 ? 360 - turned : turned;
}

function requireAscending(bounds: readonly number[], name: string): void {
  if (bounds[0] !== 0 || bounds.some((bound, i) => i > 0 && bound <= bounds[i - 1])) {
    throw new RangeError(`${name} of wind bins must ascend from zero.`);
  }
}

function short(value: number): string {
  return String(Number(value.toPrecision(3)));
}
