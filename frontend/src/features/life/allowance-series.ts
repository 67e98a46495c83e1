import type { PartLifeDto } from '@stayledger/shared/contracts/life';

export interface AllowancePoint {
  /** 'YYYY-MM-DD' in the vessel's zone. */
  on: string;
  /** Allowance used by the end of that day; 1 is the whole allowance. */
  allowance: number;
}

/**
 * The account of the governing detail as a running total: each recorded day adds what it used, and the last point is
 * today's standing. Days on which nothing was recorded have no point; the line between is straight.
 */
export function usedSoFar(life: Pick<PartLifeDto, 'days' | 'asOfOn' | 'standing'>): AllowancePoint[] {
  if (life.days.length === 0) return [];
  const byDay = new Map<string, number>();
  for (const { dayOn, allowance } of life.days) byDay.set(dayOn, (byDay.get(dayOn) ?? 0) + allowance);
  const points: AllowancePoint[] = [];
  let total = 0;
  for (const on of [...byDay.keys()].sort()) {
    // The line starts at nothing used on the eve of the first recorded day.
    if (points.length === 0) points.push({ on: dayBefore(on), allowance: 0 });
    total += byDay.get(on) ?? 0;
    points.push({ on, allowance: total });
  }
  const used = life.standing.allowanceUsed;
  const last = points[points.length - 1];
  if (used !== null && life.asOfOn >= last.on) {
    // Cycles that close between logs belong to no single day; today's standing includes them.
    if (life.asOfOn === last.on) last.allowance = used;
    else points.push({ on: life.asOfOn, allowance: used });
  }
  return points;
}

const DAY_MS = 86_400_000;

function dayBefore(day: string): string {
  return new Date(Date.parse(day) - DAY_MS).toISOString().slice(0, 10);
}
