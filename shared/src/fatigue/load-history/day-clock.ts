import type { ZoneOffset } from './load-log.js';

const DAY_MS = 86_400_000;

/** Splits blocks of rows into runs of one calendar day in the vessel's zone; the zone is looked up once a day. */
export class DayClock {
  /** Ends of the runs of the last block, and their days since 1970-01-01. */
  readonly runEnd: number[] = [];
  readonly runDay: number[] = [];
  private day = 0;
  private fromMs = 1;
  private toMs = 0;

  /**
   * @param offsets ascending offsets of the zone; none: UTC
   * @param hasTime false: everything is day 0
   */
  constructor(
    private readonly offsets: readonly ZoneOffset[],
    private readonly hasTime: boolean,
  ) {}

  /** Splits the first `rows` rows; a row without time belongs to the day of the row before it. */
  split(timesMs: Float64Array, rows: number): void {
    const { runEnd, runDay } = this;
    runEnd.length = 0;
    runDay.length = 0;
    let { day } = this;
    if (this.hasTime) {
      let { fromMs, toMs } = this;
      for (let i = 0; i < rows; i++) {
        const time = timesMs[i];
        if ((time >= fromMs && time < toMs) || time !== time) continue;
        this.lookUp(time);
        ({ fromMs, toMs } = this);
        if (this.day === day) continue;
        if (i > 0) {
          runEnd.push(i);
          runDay.push(day);
        }
        day = this.day;
      }
    }
    runEnd.push(rows);
    runDay.push(day);
  }

  private lookUp(timeMs: number): void {
    const { offsets } = this;
    let at = 0;
    while (at + 1 < offsets.length && offsets[at + 1].fromMs <= timeMs) at++;
    const offsetMs = offsets.length > 0 ? offsets[at].offsetMinutes * 60_000 : 0;
    this.day = Math.floor((timeMs + offsetMs) / DAY_MS);
    this.fromMs = Math.max(this.day * DAY_MS - offsetMs, at > 0 ? offsets[at].fromMs : -Infinity);
    const next = at + 1 < offsets.length ? offsets[at + 1].fromMs : Infinity;
    this.toMs = Math.min((this.day + 1) * DAY_MS - offsetMs, next);
  }
}
