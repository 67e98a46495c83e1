import type { Findings } from './findings.js';
import type { ChannelConfig } from './load-log.js';

/** Above this share of the sampling rate, a sampled oscillation loses about half its damage (sampling table). */
const HIGHEST_RATE_SHARE = 0.3;
const STUCK_SECONDS = 120;
const STUCK_LEAST_ROWS = 120;
/** Rows between two looks at whether a value has changed. */
const STRIDE = 32;
/** Of every so many blocks one is looked at for the dominant frequency. */
const FREQUENCY_BLOCKS = 8;
const LEAST_FREQUENCY_ROWS = 512;
/** Hampel identifier: half window, and the factor that makes a median deviation a standard deviation. */
const HAMPEL_HALF = 3;
const HAMPEL_SIGMAS = 3;
const MAD_TO_SIGMA = 1.4826;
/** Loads this much above the limit point to another unit rather than to a peak. */
const UNIT_DOUBT_FACTOR = 20;

/** Watches one channel for what a sensor or recorder does wrong. Marks, never changes a load. */
export class SignalWatch {
  /** Dominant frequency over sampling rate, 0 while unknown. */
  rateShare = 0;
  private maximum = -Infinity;
  private samplesAtMaximum = 0;
  private samplesBelowMaximum = 0;
  private plateaus = 0;
  private plateauPlace = { line: 0, ms: NaN };
  private blocks = 0;
  private crossings = 0;
  private crossingRows = 0;
  private rowsBefore = 0;
  private sameValue = NaN;
  private sameFrom = 0;
  private sameFromMs = NaN;
  private sameFromLine = 0;
  private readonly stuckRuns: { from: number; to: number; line: number; fromMs: number; toMs: number }[] = [];
  /** Stretches of rows in which the value changed, coarsely, as first and last row. */
  private lastChange = -1;
  private readonly changes: number[] = [];

  constructor(
    private readonly config: ChannelConfig,
    private readonly findings: Findings,
  ) {}

  /** A new largest load: what was seen at the old one is no plateau. */
  newMaximum(max: number): void {
    this.maximum = max;
    this.samplesAtMaximum = 0;
    this.samplesBelowMaximum = 0;
    this.plateaus = 0;
  }

  /** Looks at one block, in kN. */
  look(
    values: Float64Array,
    rows: number,
    times: Float64Array,
    lines: Int32Array,
    min: number,
    max: number,
    sampleRateHz: number | null,
  ): void {
    const { limitKn } = this.config;
    if (limitKn !== undefined && max > limitKn) this.overLimit(values, rows, times, lines, limitKn);
    if (max > 0 && max >= 0.98 * this.maximum) this.flatTop(values, rows, times, lines);
    if (max > 0 && max >= 0.5 * this.maximum && max > min) this.spike(values, rows, times, lines, max);
    if (this.blocks++ % FREQUENCY_BLOCKS === 0) this.frequency(values, rows, min, max);
    this.stuck(values, rows, times, lines, sampleRateHz);
    this.rowsBefore += rows;
  }

  /** Findings that need the whole log. */
  conclude(
    sampleRateHz: number | null,
    others: SignalWatch[],
    minKn: number,
    maxKn: number,
    otherUnit: boolean,
  ): void {
    const { column, limitKn } = this.config;
    if (this.plateaus >= 3 && this.samplesAtMaximum > this.samplesBelowMaximum && maxKn > minKn) {
      this.findings.note('saturation', { column, ...this.plateauPlace }, this.plateaus);
    }
    if (this.crossingRows >= LEAST_FREQUENCY_ROWS && sampleRateHz !== null) {
      this.rateShare = this.crossings / this.crossingRows;
      if (this.rateShare > HIGHEST_RATE_SHARE) this.findings.note('low-rate', { column });
    }
    if (limitKn !== undefined && maxKn > UNIT_DOUBT_FACTOR * limitKn && !otherUnit) {
      this.findings.note('unit-doubt', { column });
    }
    this.endSame(this.rowsBefore, NaN, sampleRateHz);
    for (const run of this.stuckRuns) {
      if (!others.some((other) => other.movedWithin(run.from + STRIDE, run.to - STRIDE))) continue;
      this.findings.note('stuck', { column, line: run.line, ms: run.fromMs, untilMs: run.toMs });
    }
  }

  private movedWithin(from: number, to: number): boolean {
    for (let i = 0; i < this.changes.length; i += 2) {
      if (this.changes[i] < to && this.changes[i + 1] > from) return true;
    }
    return false;
  }

  private overLimit(
    values: Float64Array,
    rows: number,
    times: Float64Array,
    lines: Int32Array,
    limitKn: number,
  ): void {
    let count = 0;
    let first = -1;
    let last = -1;
    for (let i = 0; i < rows; i++) {
      if (!(values[i] > limitKn)) continue;
      if (first < 0) first = i;
      last = i;
      count++;
    }
    const place = {
      column: this.config.column,
      line: lines[first],
      ms: times[first],
      untilMs: times[last],
    };
    this.findings.note('implausible-load', place, count);
  }

  /** Loads at the very maximum, in plateaus of three samples or more, against loads just below it. */
  private flatTop(values: Float64Array, rows: number, times: Float64Array, lines: Int32Array): void {
    const { maximum } = this;
    const below = 0.98 * maximum;
    let run = 0;
    for (let i = 0; i < rows; i++) {
      const value = values[i];
      if (value === maximum) {
        this.samplesAtMaximum++;
        if (++run !== 3) continue;
        if (this.plateaus++ === 0) this.plateauPlace = { line: lines[i - 2], ms: times[i - 2] };
      } else {
        run = 0;
        if (value >= below) this.samplesBelowMaximum++;
      }
    }
  }

  /** The highest sample of a block, when it stands alone far above the six around it. */
  private spike(
    values: Float64Array,
    rows: number,
    times: Float64Array,
    lines: Int32Array,
    max: number,
  ): void {
    const at = values.indexOf(max);
    if (at < HAMPEL_HALF || at + HAMPEL_HALF >= rows) return;
    const window = values.slice(at - HAMPEL_HALF, at + HAMPEL_HALF + 1);
    if (window.some((value) => Number.isNaN(value))) return;
    const median = window.slice().sort()[HAMPEL_HALF];
    const deviation = window.map((value) => Math.abs(value - median)).sort()[HAMPEL_HALF];
    // On quantised data the deviation can be nothing: two steps of the grid are the floor.
    const sigma = Math.max(MAD_TO_SIGMA * deviation, 2 * this.config.step);
    const height = max - median;
    const alone = max - Math.max(values[at - 1], values[at + 1]) > 0.5 * height;
    if (!alone || height <= HAMPEL_SIGMAS * sigma || height < 0.25 * max) return;
    this.findings.note('spike', { column: this.config.column, line: lines[at], ms: times[at] });
  }

  /** Crossings of the block's middle upwards: the dominant frequency as a share of the rate. */
  private frequency(values: Float64Array, rows: number, min: number, max: number): void {
    if (!(max > min)) return;
    let sum = 0;
    let present = 0;
    for (let i = 0; i < rows; i++) {
      if (values[i] !== values[i]) continue;
      sum += values[i];
      present++;
    }
    const mean = sum / present;
    let above = false;
    for (let i = 0; i < rows; i++) {
      const value = values[i];
      if (value > mean) {
        if (!above && i > 0) this.crossings++;
        above = true;
      } else if (value < mean) {
        above = false;
      }
    }
    this.crossingRows += present;
  }

  /** Follows how long the value has been the same, looking at every 32nd row and closer only when two are equal. */
  private stuck(
    values: Float64Array,
    rows: number,
    times: Float64Array,
    lines: Int32Array,
    sampleRateHz: number | null,
  ): void {
    for (let i = 0; i < rows; i += STRIDE) {
      const end = Math.min(rows, i + STRIDE);
      const same = this.sameValue;
      let j = i;
      if (values[i] === same && values[end - 1] === same) while (j < end && values[j] === same) j++;
      if (j === end) continue;
      this.endSame(this.rowsBefore + j, times[Math.max(0, j - 1)], sampleRateHz);
      this.sameValue = values[end - 1];
      this.sameFrom = this.rowsBefore + end - 1;
      this.sameFromMs = times[end - 1];
      this.sameFromLine = lines[end - 1];
      this.changed(this.rowsBefore + i, this.rowsBefore + end);
    }
  }

  private changed(from: number, to: number): void {
    const { changes } = this;
    // Changes close to the last ones extend them; a long log must not grow this list without bound.
    if (changes.length > 0 && (from - this.lastChange <= STUCK_LEAST_ROWS || changes.length > 8192)) {
      changes[changes.length - 1] = to;
    } else {
      changes.push(from, to);
    }
    this.lastChange = to;
  }

  private endSame(row: number, timeMs: number, sampleRateHz: number | null): void {
    const long = Math.max(STUCK_LEAST_ROWS, Math.ceil(STUCK_SECONDS * (sampleRateHz ?? 1)));
    const isZero = Math.abs(this.sameValue) <= Math.max(2 * this.config.step, 0.01 * Math.abs(this.maximum));
    // A slack part reads nothing for hours, and that is no fault.
    if (row - this.sameFrom < long || isZero || Number.isNaN(this.sameValue)) return;
    if (this.stuckRuns.length >= 1000) return;
    const { sameFrom, sameFromLine, sameFromMs } = this;
    this.stuckRuns.push({ from: sameFrom, to: row, line: sameFromLine, fromMs: sameFromMs, toMs: timeMs });
  }
}
