/** The browser's only reader of the time of day; everything else is given an instant or a day. */
export class Clock {
  now(): string {
    return new Date().toISOString();
  }

  /** The calendar day it is in a zone, 'YYYY-MM-DD'. */
  todayOn(zone: string): string {
    const parts = new Intl.DateTimeFormat('en', {
      timeZone: zone,
      year: 'numeric',
      month: '2-digit',
      day: '2-digit',
    }).formatToParts(new Date());
    const part = (type: string) => parts.find((candidate) => candidate.type === type)?.value ?? '';
    return `${part('year')}-${part('month')}-${part('day')}`;
  }
}

export const clock = new Clock();

/** The zone this browser keeps. */
export function browserZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone;
}
