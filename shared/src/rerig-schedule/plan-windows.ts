import { dayNumber, dayOfNumber } from '../fatigue/life/days.js';
import type { PlanWindow, VisitKind } from './plan-input.js';

/** A stretch of days, both included, 'YYYY-MM-DD'. */
export interface DaySpan {
  fromOn: string;
  untilOn: string;
}

/** A season in which the yard takes vessels. */
export interface YardSeason extends DaySpan {
  id: string;
  kinds: readonly VisitKind[];
  visitCostMinor?: PlanWindow['visitCostMinor'];
}

/** Windows of a vessel, and the seasons in which it has none. */
export interface VesselWindows {
  windows: PlanWindow[];
  /** Ids of seasons of which closures and absences leave too little. */
  lostSeasonIds: string[];
}

/** Least days that are worth calling a window. An engineering choice without a source. */
export const LEAST_WINDOW_DAYS = 5;

/**
 * The windows of one vessel: each season of the yard less the yard's closures and the vessel's own absences (charter,
 * passage, lay-up elsewhere), of which the longest stretch left is taken, the first of equals. Closures may overlap one
 * another. A window keeps the id of its season, so that vessels of a firm share the room in it.
 *
 * @throws RangeError for days that are not calendar days and for spans that end before they begin
 */
export function planWindows(
  seasons: readonly YardSeason[],
  closures: readonly DaySpan[],
  absences: readonly DaySpan[],
): VesselWindows {
  const closed = [...closures, ...absences].map(numbered).sort((one, other) => one.from - other.from);
  const windows: PlanWindow[] = [];
  const lostSeasonIds: string[] = [];
  for (const season of seasons) {
    const open = longestOpen(numbered(season), closed);
    if (open === null || open.until - open.from + 1 < LEAST_WINDOW_DAYS) {
      lostSeasonIds.push(season.id);
      continue;
    }
    windows.push({
      id: season.id,
      opensOn: dayOfNumber(open.from),
      closesOn: dayOfNumber(open.until),
      kinds: season.kinds,
      ...(season.visitCostMinor === undefined ? {} : { visitCostMinor: season.visitCostMinor }),
    });
  }
  return { windows, lostSeasonIds };
}

interface NumberedSpan {
  from: number;
  until: number;
}

function numbered({ fromOn, untilOn }: DaySpan): NumberedSpan {
  const span = { from: dayNumber(fromOn), until: dayNumber(untilOn) };
  if (span.until < span.from) throw new RangeError(`${fromOn} to ${untilOn} ends before it begins.`);
  return span;
}

/** The longest stretch of a season outside all closed spans, which come in order of their beginning. */
function longestOpen(season: NumberedSpan, closed: readonly NumberedSpan[]): NumberedSpan | null {
  let best: NumberedSpan | null = null;
  let from = season.from;
  const offer = (until: number): void => {
    if (until >= from && (best === null || until - from > best.until - best.from)) best = { from, until };
  };
  for (const span of closed) {
    if (span.from > season.until) break;
    offer(span.from - 1);
    from = Math.max(from, span.until + 1);
  }
  offer(season.until);
  return best;
}
