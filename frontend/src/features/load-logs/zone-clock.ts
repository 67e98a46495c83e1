/**
 * The clock on the wall of a time zone, written as if it were UTC: the local time 14:05 is the number whose UTC reading
 * is 14:05. That makes local midnights and whole hours plain arithmetic.
 */
export interface ZoneClock {
  toLocal(atMs: number): number;
  toInstant(localMs: number): number;
  /** Minutes east of UTC at an instant. */
  offsetMinutes(atMs: number): number;
}

export function zoneClock(zone: string): ZoneClock {
  const format = new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  });
  const toLocal = (atMs: number): number => {
    const part: Record<string, number> = {};
    for (const { type, value } of format.formatToParts(atMs)) part[type] = Number(value);
    return Date.UTC(part.year, part.month - 1, part.day, part.hour, part.minute, part.second);
  };
  const wholeSeconds = (atMs: number): number => Math.floor(atMs / 1000) * 1000;
  return {
    toLocal,
    toInstant: (localMs) => {
      // The offset at the guess can differ from the one at the result only next to a change of clocks; once more settles it.
      const guess = localMs - (toLocal(localMs) - wholeSeconds(localMs));
      return localMs - (toLocal(guess) - wholeSeconds(guess));
    },
    offsetMinutes: (atMs) => Math.round((toLocal(atMs) - wholeSeconds(atMs)) / 60_000),
  };
}
