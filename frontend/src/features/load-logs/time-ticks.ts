import { zoneClock } from './zone-clock';

const MINUTE_MS = 60_000;
const HOUR_MS = 60 * MINUTE_MS;
const DAY_MS = 24 * HOUR_MS;
const STEPS_MS = [
  MINUTE_MS,
  2 * MINUTE_MS,
  5 * MINUTE_MS,
  10 * MINUTE_MS,
  15 * MINUTE_MS,
  30 * MINUTE_MS,
  HOUR_MS,
  2 * HOUR_MS,
  3 * HOUR_MS,
  6 * HOUR_MS,
  12 * HOUR_MS,
  DAY_MS,
  2 * DAY_MS,
  7 * DAY_MS,
  14 * DAY_MS,
];
const MONTH_STEPS = [1, 2, 3, 6, 12, 24, 60, 120];
const MONTH_DAYS = 30.44;

export interface TimeTick {
  atMs: number;
  /** A day's beginning gets the date, all others the clock time. */
  isDayStart: boolean;
}

/**
 * Marks for a time axis, at round times of the given zone's own clock: whole minutes, hours, days or months,
 * whichever gives at most `wanted` of them. Days keep starting at midnight across a change of clocks.
 */
export function timeTicks(fromMs: number, toMs: number, zone: string, wanted: number): TimeTick[] {
  if (!(toMs > fromMs) || wanted < 1) return [];
  const { toLocal, toInstant } = zoneClock(zone);
  const localFrom = toLocal(fromMs);
  const localTo = toLocal(toMs);
  const leastMs = (toMs - fromMs) / wanted;
  const stepMs = STEPS_MS.find((step) => step >= leastMs);
  const locals: number[] = [];
  if (stepMs === undefined) {
    const leastMonths = leastMs / (MONTH_DAYS * DAY_MS);
    const months = MONTH_STEPS.find((step) => step >= leastMonths) ?? MONTH_STEPS[MONTH_STEPS.length - 1];
    const year = new Date(localFrom).getUTCFullYear();
    for (let month = 0; Date.UTC(year, month, 1) <= localTo; month += months)
      locals.push(Date.UTC(year, month, 1));
  } else {
    for (let local = Math.floor(localFrom / stepMs) * stepMs; local <= localTo; local += stepMs)
      locals.push(local);
  }
  return locals
    .map((local) => ({ atMs: toInstant(local), isDayStart: local % DAY_MS === 0 }))
    .filter(({ atMs }) => atMs >= fromMs && atMs <= toMs);
}
