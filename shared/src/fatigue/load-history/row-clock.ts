import { BLOCK_ROWS, type CsvBlock } from './csv-scanner.js';
import type { Findings } from './findings.js';
import type { LogTimeSource } from './load-log.js';

const HOUR_MS = 3_600_000;
/** Shortest default gap limit. */
const LEAST_GAP_MS = 1000;
const DEFAULT_GAP_PERIODS = 3;

/** Follows the time of the rows: gaps, backward and repeated times, logged hours, sampling rate. */
export class RowClock {
  /** Whether rows have instants at all. */
  readonly hasTime: boolean;
  gapLimitMs: number;
  private readonly generated: Float64Array | null;
  private readonly startMs: number;
  private periodMs = NaN;
  private previousMs = NaN;
  private firstMs = Infinity;
  private lastMs = -Infinity;
  private loggedMs = 0;
  private gapMs = 0;
  private stretches = 1;

  constructor(
    private readonly source: LogTimeSource,
    gapLimitS: number | undefined,
    private readonly findings: Findings,
  ) {
    this.gapLimitMs = gapLimitS === undefined ? NaN : gapLimitS * 1000;
    if ('rateHz' in source) {
      this.hasTime = source.startAt !== undefined;
      this.startMs = source.startAt === undefined ? 0 : Date.parse(source.startAt);
      this.generated = new Float64Array(BLOCK_ROWS);
      this.periodMs = 1000 / source.rateHz;
    } else {
      this.hasTime = true;
      this.startMs = 0;
      this.generated = null;
    }
  }

  /** Rows per second as far as known: the rate, or the median of the first block. */
  get sampleRateHz(): number | null {
    if ('rateHz' in this.source) return this.source.rateHz;
    return Number.isNaN(this.periodMs) ? null : Number((1000 / this.periodMs).toPrecision(6));
  }

  /** Reads a block. @returns the instants of its rows, epoch milliseconds */
  read(block: CsvBlock, rowsBefore: number): Float64Array {
    const { rows, lines } = block;
    if (this.generated !== null && 'rateHz' in this.source) {
      const { rateHz } = this.source;
      for (let i = 0; i < rows; i++) this.generated[i] = this.startMs + ((rowsBefore + i) * 1000) / rateHz;
      return this.generated;
    }
    const times = block.timesMs;
    if (Number.isNaN(this.periodMs)) {
      this.periodMs = medianPause(times, rows);
      if (Number.isNaN(this.gapLimitMs) && !Number.isNaN(this.periodMs)) {
        this.gapLimitMs = Math.max(LEAST_GAP_MS, DEFAULT_GAP_PERIODS * this.periodMs);
      }
    }
    const { gapLimitMs } = this;
    let previous = this.previousMs;
    let logged = 0;
    for (let i = 0; i < rows; i++) {
      const time = times[i];
      const pause = time - previous;
      if (pause > 0 && pause <= gapLimitMs) logged += pause;
      else if (time === time) this.unusual(pause, time, lines[i]);
      else continue;
      previous = time;
    }
    this.loggedMs += logged;
    this.previousMs = previous;
    // Within a block only what is unusual can lie outside its first and last instant; that is noted there.
    if (previous === previous) this.reach(previous);
    return times;
  }

  /** What the whole log says about time. */
  result(rows: number): {
    fromMs: number | null;
    toMs: number | null;
    loggedHours: number;
    gapHours: number;
    sampleRateHz: number | null;
  } {
    const { sampleRateHz } = this;
    if ('rateHz' in this.source) {
      const lastMs = this.startMs + (Math.max(0, rows - 1) * 1000) / this.source.rateHz;
      const known = this.hasTime && rows > 0;
      return {
        fromMs: known ? this.startMs : null,
        toMs: known ? lastMs : null,
        loggedHours: rows / this.source.rateHz / 3600,
        gapHours: 0,
        sampleRateHz,
      };
    }
    const known = this.lastMs >= this.firstMs;
    // Each stretch of rows also covers the period of its last one.
    const periods = Number.isNaN(this.periodMs) ? 0 : this.stretches * this.periodMs;
    return {
      fromMs: known ? this.firstMs : null,
      toMs: known ? this.lastMs : null,
      loggedHours: known ? (this.loggedMs + periods) / HOUR_MS : 0,
      gapHours: this.gapMs / HOUR_MS,
      sampleRateHz,
    };
  }

  private unusual(pause: number, time: number, line: number): void {
    this.reach(time);
    const before = this.previousOf(pause, time);
    if (before === null) return;
    this.reach(before);
    if (pause < 0) {
      this.stretches++;
      this.findings.note('time-backwards', { line, ms: time });
    } else if (pause === 0) {
      this.findings.note('time-repeated', { line, ms: time });
    } else if (Number.isNaN(this.gapLimitMs)) {
      this.loggedMs += pause;
    } else {
      this.stretches++;
      this.gapMs += pause;
      this.findings.note('gap', { line, ms: before, untilMs: time });
    }
  }

  private previousOf(pause: number, time: number): number | null {
    return Number.isNaN(pause) ? null : time - pause;
  }

  private reach(time: number): void {
    if (time < this.firstMs) this.firstMs = time;
    if (time > this.lastMs) this.lastMs = time;
  }
}

/** Median of the pauses between rows that go forward; NaN without any. */
function medianPause(times: Float64Array, rows: number): number {
  const pauses: number[] = [];
  for (let i = 1; i < rows; i++) {
    const pause = times[i] - times[i - 1];
    if (pause > 0) pauses.push(pause);
  }
  if (pauses.length === 0) return NaN;
  return Float64Array.from(pauses).sort()[pauses.length >> 1];
}
