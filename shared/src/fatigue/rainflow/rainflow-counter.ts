import { ClosedCycles } from './closed-cycles.js';
import { levelOf } from './level-of.js';
import type { CycleTable, LoadSpectrum } from './load-spectrum.js';
import { mergeCycleTables } from './merge-cycle-tables.js';
import { mergeSpectra } from './merge-spectra.js';
import { reduceResidue } from './reduce-residue.js';
import { encodeParts, encodeSpectrum } from './spectrum-codec.js';
import { tablesByDay } from './tables-by-day.js';

/** Samples handled at once; bounds the room needed on the stack. */
const PART = 4096;

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
  private readonly cycles: ClosedCycles;
  private day = NaN;
  private stack = new Float64Array(PART + 64);
  private stackDay = new Int32Array(PART + 64);
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
    this.cycles = new ClosedCycles(options.step > 0);
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
    let cycles = this.cycles.held;
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
    if (day !== this.day) {
      this.cycles.packOther(day);
      this.day = day;
    }
    for (let from = 0; from < n; from += PART) {
      const to = Math.min(n, from + PART);
      const begun = this.direction === 0 ? this.findDirection(block, from, to, day) : from;
      if (begun < to) this.run(block, begun, to, day);
    }
    if (this.last === Infinity || this.last === -Infinity) throw infiniteLoad();
  }

  /** Reads until the level changes for the first time. @returns the first sample not read */
  private findDirection(block: Float64Array, from: number, to: number, day: number): number {
    const { step } = this;
    for (let i = from; i < to; i++) {
      const load = block[i];
      if (load !== load) continue;
      this.counted++;
      if (this.last !== this.last) {
        this.last = load;
        this.lastDay = day;
        this.turns = 1;
        continue;
      }
      const level = levelOf(load, step);
      const lastLevel = levelOf(this.last, step);
      if (level === lastLevel) continue;
      if (lastLevel - lastLevel !== 0) throw infiniteLoad();
      this.stack[0] = lastLevel;
      this.stackDay[0] = this.lastDay;
      this.top = 1;
      this.direction = level > lastLevel ? 1 : -1;
      this.last = load;
      this.lastDay = day;
      this.turns = 2;
      return i + 1;
    }
    return to;
  }

  /**
   * The hot loop: turning points and four-point rule over samples in which the direction is known. All state is
   * in locals and written back once. The usual path, a sample that carries on, is one comparison; loads are
   * rounded to the grid only where they turn, which is exact because rounding keeps their order.
   */
  private run(block: Float64Array, from: number, to: number, day: number): void {
    this.makeRoom(to - from);
    const { step, stack, stackDay, cycles } = this;
    let { top, last } = this;
    let rising = this.direction > 0;
    let turns = 0;
    let missing = 0;
    // The running extreme keeps its earlier day until its level changes.
    let lastDay = this.lastDay;
    let oldLevel = levelOf(last, step);
    let i = from;
    while (i < to) {
      let load = block[i++];
      if (rising) {
        while (load >= last && i < to) {
          last = load;
          load = block[i++];
        }
        if (load >= last) {
          last = load;
          break;
        }
        if (load !== load) {
          missing++;
          continue;
        }
        const level = levelOf(last, step);
        if (levelOf(load, step) === level) continue;
        if (level !== oldLevel) lastDay = day;
        if (level - level !== 0) throw infiniteLoad();
        stack[top] = level;
        stackDay[top++] = lastDay;
        while (top >= 4) {
          const high = stack[top - 3];
          const low = stack[top - 2];
          // Later counts as higher: ties close on the way up.
          if (low < stack[top - 4] || high > level) break;
          cycles.add(stackDay[top - 3], low, high);
          stack[top - 3] = level;
          stackDay[top - 3] = lastDay;
          top -= 2;
        }
      } else {
        while (load <= last && i < to) {
          last = load;
          load = block[i++];
        }
        if (load <= last) {
          last = load;
          break;
        }
        if (load !== load) {
          missing++;
          continue;
        }
        const level = levelOf(last, step);
        if (levelOf(load, step) === level) continue;
        if (level !== oldLevel) lastDay = day;
        if (level - level !== 0) throw infiniteLoad();
        stack[top] = level;
        stackDay[top++] = lastDay;
        while (top >= 4) {
          const low = stack[top - 3];
          const high = stack[top - 2];
          // Later counts as higher: ties stay open on the way down.
          if (high >= stack[top - 4] || low <= level) break;
          cycles.add(stackDay[top - 2], low, high);
          stack[top - 3] = level;
          stackDay[top - 3] = lastDay;
          top -= 2;
        }
      }
      turns++;
      rising = !rising;
      last = load;
      lastDay = day;
      oldLevel = NaN;
    }
    if (turns === 0 && levelOf(last, step) !== oldLevel) lastDay = day;
    this.top = top;
    this.last = last;
    this.lastDay = lastDay;
    this.direction = rising ? 1 : -1;
    this.turns += turns;
    this.counted += to - from - missing;
  }

  /** The load spectrum of everything so far. The counter can carry on afterwards. */
  spectrum(): LoadSpectrum {
    const own = this.own();
    return this.before === null ? own : mergeSpectra(this.before, own);
  }

  /**
   * The load spectrum of everything so far as bytes: the same as `encodeSpectrum(spectrum())`, without taking the
   * memory of the whole spectrum.
   */
  encoded(): Uint8Array {
    const { step, cycles } = this;
    const { residue, residueDay, late } = this.ending();
    const days = step > 0 && this.before === null ? cycles.packedDays(late) : null;
    if (days === null || !residue.every(Number.isSafeInteger)) return encodeSpectrum(this.spectrum());
    const { counted: samples, turns: turningPoints } = this;
    return encodeParts({ step, days, residue, residueDay, samples, turningPoints }, true);
  }

  private own(): LoadSpectrum {
    const { residue, residueDay, late } = this.ending();
    const days = new Map(this.cycles.days().map(({ day, cycles }) => [day, cycles]));
    for (const [day, table] of late) {
      const known = days.get(day);
      days.set(day, known === undefined ? table : mergeCycleTables([known, table]));
    }
    return {
      step: this.step,
      days: [...days].sort(([a], [b]) => a - b).map(([day, cycles]) => ({ day, cycles })),
      residue,
      residueDay,
      samples: this.counted,
      turningPoints: this.turns,
    };
  }

  /**
   * The residue with the running extreme as its last point, and the cycles that closes. The counter itself does
   * not change: the extreme may still move on.
   */
  private ending(): { residue: Float64Array; residueDay: Int32Array; late: Map<number, CycleTable> } {
    const size = this.top + (this.last === this.last ? 1 : 0);
    const open = this.stack.slice(0, size);
    const openDay = this.stackDay.slice(0, size);
    if (size > this.top) {
      open[size - 1] = levelOf(this.last, this.step);
      openDay[size - 1] = this.lastDay;
    }
    // Adding zero turns -0 into 0: equal loads, equal bytes.
    for (let i = 0; i < size; i++) open[i] += 0;
    const reduced = reduceResidue(open, openDay);
    const { residue, residueDay } = reduced;
    return { residue, residueDay, late: tablesByDay(reduced) };
  }

  /** Room on the stack for one more turning point a sample. */
  private makeRoom(samples: number): void {
    const needed = this.top + samples + 1;
    if (needed <= this.stack.length) return;
    const size = Math.max(needed, this.stack.length * 2);
    const stack = new Float64Array(size);
    stack.set(this.stack);
    this.stack = stack;
    const days = new Int32Array(size);
    days.set(this.stackDay);
    this.stackDay = days;
  }
}

function infiniteLoad(): RangeError {
  return new RangeError('a load is infinite');
}
