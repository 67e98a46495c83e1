import { zoneClock } from './zone-clock';
import type { Envelope } from './trace-path';

const DAY_MS = 86_400_000;

/**
 * The moment of the highest load on one day of the zone's calendar, over all traces, in epoch milliseconds; null when
 * the day has no data or is no day.
 */
export function highestMomentOfDay(traces: readonly Envelope[], dayOn: string, zone: string): number | null {
  const localMidnight = Date.parse(`${dayOn}T00:00:00Z`);
  if (Number.isNaN(localMidnight)) return null;
  const clock = zoneClock(zone);
  const fromMs = clock.toInstant(localMidnight);
  const toMs = clock.toInstant(localMidnight + DAY_MS);
  let best: { atMs: number; kn: number } | null = null;
  for (const trace of traces) {
    for (let index = 0; index < trace.atMs.length; index += 1) {
      const atMs = trace.atMs[index];
      if (atMs < fromMs || atMs >= toMs) continue;
      if (best === null || trace.highKn[index] > best.kn) best = { atMs, kn: trace.highKn[index] };
    }
  }
  return best?.atMs ?? null;
}
