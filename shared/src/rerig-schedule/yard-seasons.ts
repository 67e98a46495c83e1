import { addMonths, dayNumber } from '../fatigue/life/days.js';
import { VISIT_KINDS } from './plan-input.js';
import type { YardSeason } from './plan-windows.js';
import type { YearlySeason } from './yard-terms.js';

/** A season of one year, with what a person calls it: "Spring 2028". */
export interface NamedSeason extends YardSeason {
  label: string;
}

/**
 * The yearly seasons of a yard from one day to another, in order of their beginning. A season that has begun counts from
 * the day asked for; one that ends after the last day is left out.
 *
 * @throws RangeError for days that are not calendar days
 */
export function yardSeasons(
  seasons: readonly YearlySeason[],
  fromOn: string,
  untilOn: string,
): NamedSeason[] {
  dayNumber(fromOn);
  dayNumber(untilOn);
  const [first, last] = [Number(fromOn.slice(0, 4)) - 1, Number(untilOn.slice(0, 4))];
  const named: NamedSeason[] = [];
  for (let year = first; year <= last; year++) {
    for (const { id, name, fromDay, untilDay } of seasons) {
      const wraps = untilDay < fromDay;
      const opensOn = dayOfYear(year, fromDay);
      const closesOn = dayOfYear(wraps ? year + 1 : year, untilDay);
      if (closesOn < fromOn || closesOn > untilOn) continue;
      named.push({
        id: `${year}-${id}`,
        label: wraps ? `${name} ${year}/${String((year + 1) % 100).padStart(2, '0')}` : `${name} ${year}`,
        fromOn: opensOn < fromOn ? fromOn : opensOn,
        untilOn: closesOn,
        kinds: VISIT_KINDS,
      });
    }
  }
  return named.sort((one, other) => (one.fromOn < other.fromOn ? -1 : one.fromOn > other.fromOn ? 1 : 0));
}

/** 29 February is the 28th where the year has none. */
function dayOfYear(year: number, day: string): string {
  const whole = `${year}-${day}`;
  if (day !== '02-29') {
    dayNumber(whole);
    return whole;
  }
  return addMonths(`${year}-01-29`, 1);
}
