import { Injectable } from '@nestjs/common';

/** The only place that asks the machine what time it is; everything else is given a `Clock`, so tests can set it. */
@Injectable()
export class Clock {
  now(): Date {
    return new Date();
  }

  /** The calendar day ('YYYY-MM-DD') at this moment in an IANA zone. */
  todayIn(zone: string): string {
    return dayIn(this.now(), zone);
  }
}

/** The calendar day ('YYYY-MM-DD') of an instant in an IANA zone. */
export function dayIn(instant: Date, zone: string): string {
  const parts = new Intl.DateTimeFormat('en', {
    timeZone: zone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
  }).formatToParts(instant);
  const part = (type: string) => parts.find((candidate) => candidate.type === type)?.value ?? '';
  return `${part('year').padStart(4, '0')}-${part('month')}-${part('day')}`;
}
