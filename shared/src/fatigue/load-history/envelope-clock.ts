import type { Envelope } from './load-log.js';

/** Most buckets an envelope holds. */
export const ENVELOPE_BUCKETS = 4096;

const FIRST_BUCKET_MS = 1000;

/**
 * The common buckets of the envelopes of all channels of a log. Buckets are counted from 1970, so that envelopes
 * of neighbouring stretches fit together; when the span needs more buckets than there is room for, their length
 * doubles and neighbours are joined.
 */
export class EnvelopeClock {
  bucketMs = FIRST_BUCKET_MS;
  /** Ends of the runs of rows that share a bucket, and their places in the arrays, for the last block split. */
  readonly runEnd: number[] = [];
  readonly runPlace: number[] = [];
  private first = 0;
  private size = 0;
  private readonly minima: Float64Array[] = [];
  private readonly maxima: Float64Array[] = [];

  constructor(channels: number) {
    for (let i = 0; i < channels; i++) {
      this.minima.push(new Float64Array(ENVELOPE_BUCKETS).fill(Infinity));
      this.maxima.push(new Float64Array(ENVELOPE_BUCKETS).fill(-Infinity));
    }
  }

  /** Splits a block of rows into runs within one bucket; a row without time stays with the row before it. */
  split(timesMs: Float64Array, rows: number): void {
    const { runEnd, runPlace } = this;
    let low = Infinity;
    let high = -Infinity;
    for (let i = 0; i < rows; i++) {
      const time = timesMs[i];
      if (time < low) low = time;
      if (time > high) high = time;
    }
    if (low <= high) this.makeRoom(low, high);
    runEnd.length = 0;
    runPlace.length = 0;
    const { bucketMs, first } = this;
    let from = -Infinity;
    let to = -Infinity;
    let place = Math.max(0, this.size - 1);
    for (let i = 0; i < rows; i++) {
      const time = timesMs[i];
      if ((time >= from && time < to) || time !== time) continue;
      if (i > 0) {
        runEnd.push(i);
        runPlace.push(place);
      }
      const bucket = Math.floor(time / bucketMs);
      from = bucket * bucketMs;
      to = from + bucketMs;
      place = bucket - first;
    }
    runEnd.push(rows);
    runPlace.push(place);
    if (this.size === 0) this.size = 1;
  }

  /** Enters the extremes of the block last split. @returns the block's smallest and largest value */
  enter(channel: number, values: Float64Array): { min: number; max: number } {
    const minima = this.minima[channel];
    const maxima = this.maxima[channel];
    let blockMin = Infinity;
    let blockMax = -Infinity;
    let i = 0;
    for (let run = 0; run < this.runEnd.length; run++) {
      const end = this.runEnd[run];
      const place = this.runPlace[run];
      let min = minima[place];
      let max = maxima[place];
      const keptMin = min;
      const keptMax = max;
      min = Infinity;
      max = -Infinity;
      for (; i < end; i++) {
        const value = values[i];
        if (value < min) min = value;
        if (value > max) max = value;
      }
      if (min < blockMin) blockMin = min;
      if (max > blockMax) blockMax = max;
      minima[place] = min < keptMin ? min : keptMin;
      maxima[place] = max > keptMax ? max : keptMax;
    }
    return { min: blockMin, max: blockMax };
  }

  /** The envelope of one channel so far. */
  envelope(channel: number): Envelope {
    const minKn = this.minima[channel].slice(0, this.size);
    const maxKn = this.maxima[channel].slice(0, this.size);
    for (let i = 0; i < minKn.length; i++) {
      if (minKn[i] > maxKn[i]) minKn[i] = maxKn[i] = NaN;
    }
    return { bucketMs: this.bucketMs, fromMs: this.first * this.bucketMs, minKn, maxKn };
  }

  private makeRoom(lowMs: number, highMs: number): void {
    if (this.size === 0) {
      this.first = Math.floor(lowMs / this.bucketMs);
      this.size = 1;
    }
    for (;;) {
      const first = Math.min(this.first, Math.floor(lowMs / this.bucketMs));
      const last = Math.max(this.first + this.size - 1, Math.floor(highMs / this.bucketMs));
      if (last - first < ENVELOPE_BUCKETS) {
        if (first < this.first) this.shift(this.first - first);
        this.first = first;
        this.size = last - first + 1;
        return;
      }
      this.double();
    }
  }

  private shift(by: number): void {
    for (const [arrays, none] of [
      [this.minima, Infinity],
      [this.maxima, -Infinity],
    ] as const) {
      for (const array of arrays) {
        array.copyWithin(by, 0, this.size);
        array.fill(none, 0, by);
      }
    }
  }

  private double(): void {
    const first = Math.floor(this.first / 2);
    const last = Math.floor((this.first + this.size - 1) / 2);
    const offset = this.first - first * 2;
    for (let channel = 0; channel < this.minima.length; channel++) {
      const minima = this.minima[channel];
      const maxima = this.maxima[channel];
      // In place: the target of a pair never lies behind its sources.
      for (let target = 0; target <= last - first; target++) {
        let min = Infinity;
        let max = -Infinity;
        for (let source = target * 2 - offset; source < target * 2 - offset + 2; source++) {
          if (source < 0 || source >= this.size) continue;
          if (minima[source] < min) min = minima[source];
          if (maxima[source] > max) max = maxima[source];
        }
        minima[target] = min;
        maxima[target] = max;
      }
      minima.fill(Infinity, last - first + 1);
      maxima.fill(-Infinity, last - first + 1);
    }
    this.first = first;
    this.size = last - first + 1;
    this.bucketMs *= 2;
  }
}
