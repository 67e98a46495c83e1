import { createHash } from 'node:crypto';
import { swingingCsv } from '../log-journey.js';

/** A log every vessel of a run sends: the same bytes, so that all accounts must end the same. */
export interface PlannedLog {
  name: string;
  bytes: Buffer;
  sha256: string;
  pieces: number;
  /** Given up by its person half way. */
  cancelled: boolean;
}

/** Some minutes' work for a killed service: five logs that are posted and one that is cancelled. */
export function planLogs(): PlannedLog[] {
  return ['01', '02', '03', '04', '05', '06'].map((month, i) => {
    const bytes = Buffer.from(
      swingingCsv({
        start: `2026-${month}-03T06:00:00Z`,
        hours: 14,
        lowKn: 2 + i,
        highKn: 11 + 2 * i,
        stepS: 1,
      }),
    );
    return {
      name: `month-${month}.csv`,
      bytes,
      sha256: createHash('sha256').update(bytes).digest('hex'),
      pieces: 5 + i,
      cancelled: i === 3,
    };
  });
}
