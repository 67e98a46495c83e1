import type { ZoneOffset } from '@stayledger/shared/fatigue/load-history/load-log';

/** Recordings of rig loads are not older than this, and clocks are not trusted further ahead. */
const FROM_MS = Date.UTC(1990, 0, 1);
const TO_MS = Date.UTC(2060, 0, 1);
/** Rules of zones never change twice within a fortnight. */
const STEP_MS = 14 * 86_400_000;

const known = new Map<string, ZoneOffset[]>();

/**
 * How far local clocks of a zone are ahead of UTC, from 1990 to 2060, for the engine, which knows no zones: one entry
 * for each change. Asked of the runtime's own zone data once per zone.
 *
 * @param zone IANA name
 */
export function zoneOffsets(zone: string): ZoneOffset[] {
  const cached = known.get(zone);
  if (cached) return cached;
  const offsetAt = offsetReader(zone);
  const offsets: ZoneOffset[] = [{ fromMs: FROM_MS, offsetMinutes: offsetAt(FROM_MS) }];
  for (let ms = FROM_MS; ms < TO_MS; ms += STEP_MS) {
    const before = offsetAt(ms);
    const after = offsetAt(ms + STEP_MS);
    if (before !== after)
      offsets.push({ fromMs: changeBetween(ms, ms + STEP_MS, offsetAt), offsetMinutes: after });
  }
  known.set(zone, offsets);
  return offsets;
}

function changeBetween(from: number, to: number, offsetAt: (ms: number) => number): number {
  const before = offsetAt(from);
  let low = from;
  let high = to;
  while (high - low > 1000) {
    const middle = low + Math.floor((high - low) / 2000) * 1000;
    if (offsetAt(middle) === before) low = middle;
    else high = middle;
  }
  return high;
}

function offsetReader(zone: string): (ms: number) => number {
  const format = new Intl.DateTimeFormat('en', { timeZone: zone, timeZoneName: 'longOffset' });
  return (ms) => {
    const name = format.formatToParts(ms).find(({ type }) => type === 'timeZoneName')?.value ?? 'GMT';
    const match = /^GMT(?:([+-])(\d{2}):(\d{2}))?/.exec(name);
    if (!match?.[1]) return 0;
    const minutes = Number(match[2]) * 60 + Number(match[3]);
    return match[1] === '-' ? -minutes : minutes;
  };
}
