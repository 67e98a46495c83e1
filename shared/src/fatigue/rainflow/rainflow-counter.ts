import { CycleBins } from './cycle-bins.js';
import type { LoadSpectrum } from './load-spectrum.js';
import { mergeAll } from './merge-spectra.js';

/** A counter's whole state as plain data, for storing and carrying on later (`RainflowCounter.fromState`). */
export interface RainflowState {
  step: number;
  /** The closed cycles and the residue so far; its last residue point is the running extreme. */
  spectrum: LoadSpectrum;
}

/**
 * Streaming rainflow counting: blocks of samples in, at any moment the load spectrum of everything so far.
 *
 * Turning points and the four-point rule run in one pass. A cycle belongs to the day of its higher extreme; an
 * extreme that lasts for several samples belongs to the day it began, and of two equal extremes the later counts
 * as the higher (`LoadSpectrum`). The result does not depend on how the samples were cut into blocks.
 */
export class RainflowCounter {
  readonly step: number;
  private readonly bins = new Map<number, CycleBins>();
  private stack = new Float64Array(64);
  private stackDay = new Int32Array(64);
  /** Turning points known to be final, on the stack. */
  private top = 0;
  /** The running extreme as a load (not a level); NaN before the first sample. */
  private last = NaN;
  private lastDay = 0;
  /** 1 rising, -1 falling, 0 before the first change. */
  private direction = 0;
  private counted = 0;
  private turns = 0;
  /** What was counted before this counter was restored from a state. */
  private before: LoadSpectrum | null = null;

  /** @param options.step grid in load units the samples are rounded to (halves upwards); 0: counted exactly */
  constructor(options: { step: number }) {
    if (!(options.step >= 0) || !Number.isFinite(options.step)) {
      throw new RangeError(`the step must be 0 or a positive number, not ${options.step}`);
    }
    this.step = options.step;
  }

  /** A counter that carries on where another one stopped. */
  static fromState(state: RainflowState): RainflowCounter {
    const counter = new RainflowCounter({ step: state.step });
    counter.before = state.spectrum;
    return counter;
  }

  /** Everything counted so far, as plain data. */
  state(): RainflowState {
    return { step: this.step, spectrum: this.spectrum() };
  }

  /** Samples counted so far. */
  get samples(): number {
    return this.counted + (this.before?.samples ?? 0);
  }

  /** Points on the residue now, and distinct cycles held: what the counter's memory grows with. */
  get held(): { residue: number; cycles: number } {
    let cycles = 0;
    for (const bins of this.bins.values()) cycles += bins.size;
    if (this.before !== null) for (const day of this.before.days) cycles += day.cycles.count.length;
    return { residue: this.top + 1 + (this.before?.residue.length ?? 0), cycles };
  }

  /**
   * Counts the first `n` samples of a block.
   *
   * @param block loads in load units (the unit of `step`); NaN is a missing sample and passed over
   * @param n how many of them
   * @param day the day all of them fall on
   * @throws RangeError when a load is infinite
   */
  push(block: Float64Array, n: number, day: number): void {
    const step = this.step;
    let { last, direction } = this;
    let i = 0;
    let missing = 0;
    while (i < n && direction === 0) {
      const load = block[i++];
      if (load !== load) {
        missing++;
      } else if (last !== last) {
        last = load;
        this.lastDay = day;
        this.turns = 1;
      } else {
        const level = step > 0 ? Math.round(load / step) : load;
        const lastLevel = step > 0 ? Math.round(last / step) : last;
        if (level !== lastLevel) {
          this.place(lastLevel, this.lastDay);
          direction = level > lastLevel ? 1 : -1;
          last = load;
          this.lastDay = day;
          this.turns = 2;
        }
      }
    }
    // The running extreme keeps its earlier day until the level changes.
    let lastDay = this.lastDay;
    let oldLevel = step > 0 ? Math.round(last / step) : last;
    for (; i < n; i++) {
      const load = block[i];
      if (direction > 0 ? load >= last : load <= last) {
        last = load;
        continue;
      }
      if (load !== load) {
        missing++;
        continue;
      }
      const level = step > 0 ? Math.round(load / step) : load;
      const lastLevel = step > 0 ? Math.round(last / step) : last;
      if (level === lastLevel) continue;
      if (lastLevel !== oldLevel) lastDay = day;
      this.place(lastLevel, lastDay);
      this.turns++;
      direction = -direction;
      last = load;
      lastDay = day;
      oldLevel = NaN;
    }
    if (oldLevel === oldLevel || n > 0) {
      const lastLevel = step > 0 ? Math.round(last / step) : last;
      if (lastLevel !== oldLevel && lastLevel === lastLevel) lastDay = day;
    }
    if (last === Infinity || last === -Infinity) throw new RangeError('a load is infinite');
    this.last = last;
    this.lastDay = lastDay;
    this.direction = direction;
    this.counted += n - missing;
  }

  /** The load spectrum of everything so far. The counter can carry on afterwards. */
  spectrum(): LoadSpectrum {
    const own = this.own();
    return this.before === null ? own : mergeAll([this.before, own]);
  }

  private own(): LoadSpectrum {
    const days = [...this.bins.keys()]
      .sort((a, b) => a - b)
      .map((day) => ({ day, cycles: this.bins.get(day)!.table() }));
    const size = this.top + (this.last === this.last ? 1 : 0);
    const residue = this.stack.slice(0, size);
    const residueDay = this.stackDay.slice(0, size);
    if (size > this.top) {
      residue[size - 1] = this.step > 0 ? Math.round(this.last / this.step) : this.last;
      residueDay[size - 1] = this.lastDay;
    }
    for (let i = 0; i < size; i++) residue[i] += 0;
    const open: LoadSpectrum = {
      step: this.step,
      days,
      residue: new Float64Array(0),
      residueDay: new Int32Array(0),
      samples: this.counted,
      turningPoints: this.turns,
    };
    // The running extreme is a turning point of the history so far and may close cycles as one.
    const end: LoadSpectrum = {
      step: this.step,
      days: [],
      residue,
      residueDay,
      samples: 0,
      turningPoints: 0,
    };
    return size === 0 ? open : { ...mergeAll([open, end]), turningPoints: this.turns };
  }

  private place(level: number, day: number): void {
    if (level - level !== 0) throw new RangeError('a load is infinite');
    if (this.top + 1 >= this.stack.length) this.growStack();
    const { stack, stackDay } = this;
    let top = this.top;
    stack[top] = level;
    stackDay[top++] = day;
    while (top >= 4) {
      const a = stack[top - 4];
      const b = stack[top - 3];
      const c = stack[top - 2];
      const d = stack[top - 1];
      if (b > c) {
        if (c < a || b > d) break;
        this.count(stackDay[top - 3], c, b);
      } else {
        if (c >= a || b <= d) break;
        this.count(stackDay[top - 2], b, c);
      }
      stack[top - 3] = d;
      stackDay[top - 3] = stackDay[top - 1];
      top -= 2;
    }
    this.top = top;
  }

  private count(day: number, low: number, high: number): void {
    let bins = this.bins.get(day);
    if (bins === undefined) {
      bins = new CycleBins(this.step > 0);
      this.bins.set(day, bins);
    }
    bins.add(low, high);
  }

  private growStack(): void {
    const stack = new Float64Array(this.stack.length * 2);
    stack.set(this.stack);
    this.stack = stack;
    const days = new Int32Array(this.stackDay.length * 2);
    days.set(this.stackDay);
    this.stackDay = days;
  }
}
