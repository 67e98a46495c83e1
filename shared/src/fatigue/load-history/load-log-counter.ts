import { isForceUnit, type ForceUnit } from '../../units/force.js';
import { coarsenSpectrum } from '../rainflow/coarsen-spectrum.js';
import { RainflowCounter } from '../rainflow/rainflow-counter.js';
import { BLOCK_ROWS, CsvScanner, type CsvBlock } from './csv-scanner.js';
import { DayClock } from './day-clock.js';
import { describeFinding } from './describe-finding.js';
import { EnvelopeClock } from './envelope-clock.js';
import { Findings } from './findings.js';
import {
  DEFAULT_BOUNDS,
  LogConfigError,
  type ChannelConfig,
  type ChannelResult,
  type CountingBounds,
  type LoadLogConfig,
  type LoadLogResult,
} from './load-log.js';
import { resolveLayout, type ResolvedLayout } from './resolve-layout.js';
import { isReadableInstant } from './readable-instant.js';
import { RECOGNITION_BYTES } from './recognise-log.js';
import { RowClock } from './row-clock.js';
import { SignalWatch } from './signal-watch.js';
import { toKnBlock } from './to-kn-block.js';

/**
 * Reads a load log from bytes in any chunking and counts its load columns as it goes: flat memory, and the same
 * result whatever the chunking.
 *
 * @example
 * const counter = new LoadLogCounter({ time: { rateHz: 1 }, channels: [{ column: 'stay', unit: 'kN', step: 0 }] });
 * counter.push(bytes);
 * const { channels, findings } = counter.finish();
 */
export class LoadLogCounter {
  private head: Uint8Array | null = new Uint8Array(RECOGNITION_BYTES);
  private headSize = 0;
  private reader: LogReader | null = null;

  /** @throws LogConfigError when the configuration cannot be followed for any log */
  constructor(private readonly config: LoadLogConfig) {
    checkConfig(config);
  }

  /** Rows counted so far. */
  get rows(): number {
    return this.reader?.rows ?? 0;
  }

  /**
   * Reads the next bytes, cut anywhere.
   * @throws LogConfigError when the log has no such column, has it twice, or is no text table
   */
  push(chunk: Uint8Array): void {
    let rest = chunk;
    if (this.head !== null) {
      const taken = Math.min(rest.length, this.head.length - this.headSize);
      this.head.set(rest.subarray(0, taken), this.headSize);
      this.headSize += taken;
      rest = rest.subarray(taken);
      if (this.headSize < this.head.length) return;
      this.begin(this.head);
    }
    if (rest.length > 0) this.reader!.push(rest);
  }

  /**
   * Counts what is left and gives the result.
   * @throws LogConfigError as `push`
   */
  finish(): LoadLogResult {
    if (this.head !== null) this.begin(this.head.subarray(0, this.headSize));
    return this.reader!.finish();
  }

  private begin(head: Uint8Array): void {
    this.head = null;
    const layout = resolveLayout(head, this.config);
    this.reader = new LogReader(this.config, layout);
    this.reader.push(head.subarray(layout.skipBytes));
  }
}

function checkConfig({ channels, time, gapLimitS, delimiter }: LoadLogConfig): void {
  if (channels.length === 0) throw new LogConfigError('no channel is configured');
  for (const { column, unit, step, limitKn } of channels) {
    if (!isForceUnit(unit))
      throw new LogConfigError(`channel "${column}": "${String(unit)}" is no unit of force`);
    if (!(step >= 0) || !Number.isFinite(step)) {
      throw new LogConfigError(`channel "${column}": the step must be 0 or a positive number of kN`);
    }
    if (limitKn !== undefined && !(limitKn > 0)) {
      throw new LogConfigError(`channel "${column}": the limit must be above 0 kN`);
    }
  }
  if ('rateHz' in time) {
    if (!(time.rateHz > 0) || !Number.isFinite(time.rateHz)) {
      throw new LogConfigError('the rate must be a positive number of rows per second');
    }
    if (time.startAt !== undefined && !isReadableInstant(Date.parse(time.startAt))) {
      throw new LogConfigError(`the start "${time.startAt}" is no instant between 1900 and 2199`);
    }
  }
  if (gapLimitS !== undefined && !(gapLimitS > 0))
    throw new LogConfigError('the gap limit must be above 0 s');
  if (delimiter !== undefined && (delimiter.length !== 1 || delimiter.charCodeAt(0) > 126)) {
    throw new LogConfigError('the delimiter must be one plain character');
  }
}

/** Reads rows once it is known where what stands. */
class LogReader {
  private readonly scanner: CsvScanner;
  private readonly channels: ChannelCount[];
  private readonly findings = new Findings();
  private readonly samples = new Map<string, string>();
  private readonly clock: RowClock;
  private readonly dayClock: DayClock;
  private readonly envelopes: EnvelopeClock;

  constructor(
    private readonly config: LoadLogConfig,
    private readonly layout: ResolvedLayout,
  ) {
    const { time } = config;
    this.clock = new RowClock(time, config.gapLimitS, this.findings);
    this.dayClock = new DayClock(config.zoneOffsets ?? [], this.clock.hasTime);
    this.envelopes = new EnvelopeClock(config.channels.length);
    const bounds = { ...DEFAULT_BOUNDS, ...config.bounds };
    this.channels = config.channels.map(
      (channel, index) => new ChannelCount(channel, layout.channelPlaces[index], bounds, this.findings),
    );
    if (layout.naiveTime) this.findings.note('time-ambiguous', {});
    for (const index of layout.averaged)
      this.findings.note('averaged', { column: config.channels[index].column });
    for (const index of layout.otherUnit.keys()) {
      this.findings.note('unit-doubt', { column: config.channels[index].column });
    }
    this.scanner = new CsvScanner(layout.csv, (block) => this.count(block), {
      unreadableCell: (place, line, text) => {
        config.channels.forEach(({ column }, index) => {
          if (layout.channelPlaces[index] !== place) return;
          this.findings.note('unreadable-cell', { column, line });
          this.keepSample(column, text);
        });
      },
      unreadableTime: (line, text) => {
        this.findings.note('time-unreadable', { line });
        this.keepSample('', text);
      },
      shortRow: (line, column, cut) => {
        this.findings.note(cut ? 'truncated' : 'short-row', { line });
        for (const channel of this.channels) {
          if (layout.csv.columns[channel.place] >= column) channel.absent++;
        }
      },
      endlessRow: (line) => this.findings.note('short-row', { line }),
    });
  }

  get rows(): number {
    return this.scanner.rows;
  }

  push(bytes: Uint8Array): void {
    this.scanner.push(bytes);
  }

  finish(): LoadLogResult {
    this.scanner.finish();
    const { clock, channels, findings, scanner } = this;
    const { rows } = scanner;
    if (rows === 0) findings.note('no-rows', {});
    const counted = clock.result(rows);
    channels.forEach((channel, index) => {
      const others = channels.filter((other) => other !== channel);
      channel.conclude(rows, counted.sampleRateHz, others, this.layout.otherUnit.has(index));
    });
    const byColumn = (column: string | undefined) =>
      channels.find((channel) => channel.config.column === column);
    const list = findings.list((code, count, place) =>
      describeFinding(code, count, place, {
        gapLimitS: clock.gapLimitMs / 1000,
        gapHours: counted.gapHours,
        sample: (column) => this.samples.get(column ?? '') ?? '',
        maxKn: (column) => byColumn(column)?.maxKn ?? NaN,
        limitKn: (column) => byColumn(column)?.config.limitKn ?? NaN,
        step: (column) => byColumn(column)?.step ?? NaN,
        rateShare: (column) => byColumn(column)?.watch.rateShare ?? NaN,
        headerUnit: (column) =>
          this.layout.otherUnit.get(this.config.channels.findIndex((channel) => channel.column === column)) ??
          '',
      }),
    );
    return {
      rows,
      fromMs: counted.fromMs,
      toMs: counted.toMs,
      loggedHours: counted.loggedHours,
      sampleRateHz: counted.sampleRateHz,
      channels: channels.map((channel, index) => channel.result(rows, this.envelopes, index, clock.hasTime)),
      findings: list,
    };
  }

  private count(block: CsvBlock): void {
    const { rows } = block;
    const times = this.clock.read(block, this.scanner.rows - rows);
    this.dayClock.split(times, rows);
    this.envelopes.split(times, rows);
    for (let index = 0; index < this.channels.length; index++) {
      this.channels[index].count(block, times, this.dayClock, this.envelopes, index, this.clock.sampleRateHz);
    }
  }

  private keepSample(column: string, text: string): void {
    if (!this.samples.has(column))
      this.samples.set(column, text.length > 40 ? `${text.slice(0, 40)}…` : text);
  }
}

/** One channel being counted. */
class ChannelCount {
  readonly watch: SignalWatch;
  minKn = Infinity;
  maxKn = -Infinity;
  /** Rows too short to have this column. */
  absent = 0;
  private maxAtMs = NaN;
  private counter: RainflowCounter;
  private readonly scratch: Float64Array | null;
  private readonly unit: ForceUnit;

  constructor(
    readonly config: ChannelConfig,
    readonly place: number,
    private readonly bounds: CountingBounds,
    private readonly findings: Findings,
  ) {
    this.counter = new RainflowCounter({ step: config.step });
    this.watch = new SignalWatch(config, findings);
    this.unit = config.unit;
    this.scratch = config.unit === 'kN' ? null : new Float64Array(BLOCK_ROWS);
  }

  /** Grid it is counted on, kN. */
  get step(): number {
    return this.counter.step;
  }

  count(
    block: CsvBlock,
    times: Float64Array,
    days: DayClock,
    envelopes: EnvelopeClock,
    index: number,
    sampleRateHz: number | null,
  ): void {
    const { rows } = block;
    let values = block.values[this.place];
    if (this.scratch !== null) {
      toKnBlock(values, this.scratch, rows, this.unit);
      values = this.scratch;
    }
    const { min, max } = envelopes.enter(index, values);
    if (min < this.minKn) this.minKn = min;
    if (max > this.maxKn) {
      this.maxAtMs = times[values.indexOf(max)];
      this.watch.newMaximum(max);
      this.maxKn = max;
    }
    this.watch.look(values, rows, times, block.lines, min, max, sampleRateHz);
    let from = 0;
    for (let run = 0; run < days.runEnd.length; run++) {
      const to = days.runEnd[run];
      const part = from === 0 ? values : values.subarray(from, to);
      this.counter.push(part, to - from, days.runDay[run]);
      from = to;
    }
    const { residue, cycles } = this.counter.held;
    if (residue > this.bounds.residuePoints || cycles > this.bounds.cycles) this.coarsen();
  }

  /** Findings that need the whole log. */
  conclude(rows: number, sampleRateHz: number | null, others: ChannelCount[], otherUnit: boolean): void {
    this.watch.conclude(
      sampleRateHz,
      others.map((other) => other.watch),
      this.minKn,
      this.maxKn,
      otherUnit,
    );
    const { column } = this.config;
    const unreadable = this.findings.count('unreadable-cell', column);
    const empty = rows - this.counter.samples - unreadable - this.absent;
    if (empty > 0) this.findings.note('missing-cell', { column }, empty);
  }

  result(rows: number, envelopes: EnvelopeClock, index: number, hasTime: boolean): ChannelResult {
    const { counter } = this;
    const { samples } = counter;
    const result = {
      column: this.config.column,
      // Made when asked for: the spectra of all channels at once are what would take memory here.
      get spectrum() {
        return counter.spectrum();
      },
      samples,
      missing: rows - samples,
      minKn: samples > 0 ? this.minKn : NaN,
      maxKn: samples > 0 ? this.maxKn : NaN,
      maxAtMs: samples > 0 && hasTime && !Number.isNaN(this.maxAtMs) ? this.maxAtMs : null,
      envelope: envelopes.envelope(index),
    };
    // Not enumerable: whoever copies a result to another thread copies figures, not functions.
    return Object.defineProperty(result, 'encodedSpectrum', {
      value: () => counter.encoded(),
    }) as typeof result & { encodedSpectrum: () => Uint8Array };
  }

  /** Goes on with the same count on a grid coarse enough to stay bounded. */
  private coarsen(): void {
    const span = Math.max(this.maxKn - this.minKn, Number.MIN_VALUE);
    let step = Math.max(roundStep(span / 20_000), this.counter.step);
    if (step === this.counter.step) step = roundStep(step * 2);
    const spectrum = coarsenSpectrum(this.counter.spectrum(), step);
    this.counter = RainflowCounter.fromState({ step, spectrum });
    if (this.findings.count('residue-capped', this.config.column) === 0) {
      this.findings.note('residue-capped', { column: this.config.column });
    }
  }
}

/** The next of 1, 2, 5, 10, … at or above a value. */
function roundStep(value: number): number {
  const power = Math.floor(Math.log10(value));
  for (const digit of [1, 2, 5]) {
    const step = Number(`${digit}e${power}`);
    if (step >= value) return step;
  }
  return Number(`1e${power + 1}`);
}
