import type { CurveSegment } from '@stayledger/shared/fatigue/curves/curve';
import type { LogTimeFormat, LogTimeSource } from '@stayledger/shared/fatigue/load-history/load-log';
import { FORCE_UNITS, isForceUnit, type ForceUnit } from '@stayledger/shared/units/force';
import { AnalyseError } from './analyse-error.js';

/** Mean-load rules of the command. */
export type AnalyseMeanRule = { kind: 'none' } | { kind: 'goodman'; ultimate: number };

/** A detail whose damage is asked for. */
export interface AnalyseDetail {
  name: string;
  /** Measure of the curve per kN. */
  factor: number;
  curve: { segments: CurveSegment[] };
  mean: AnalyseMeanRule;
}

/** A column to be counted. */
export interface AnalyseChannel {
  column: string;
  /** `null`: what the header says, kN when it says nothing. */
  unit: ForceUnit | null;
  /** kN; 0 counts exactly. */
  step: number;
  /** Ranges below are dropped after merging, kN. */
  hysteresis: number;
  limitKn?: number;
  details: AnalyseDetail[];
}

/** The configuration file of the command. */
export interface AnalyseConfig {
  time: LogTimeSource;
  delimiter?: string;
  decimalComma?: boolean;
  gapLimitS?: number;
  channels: AnalyseChannel[];
}

/**
 * The configuration of the command from its file's text.
 * @throws AnalyseError naming the place, as `channels[0].details[1].curve.segments[0].m`
 */
export function readConfig(text: string): AnalyseConfig {
  let json: unknown;
  try {
    json = JSON.parse(text.replace(/^\uFEFF/, ''));
  } catch (error) {
    throw new AnalyseError(`is not JSON: ${error instanceof Error ? error.message : String(error)}`);
  }
  const root = new Place(json, '').object([
    'format',
    'time',
    'channels',
    'delimiter',
    'decimalComma',
    'gapLimitS',
  ]);
  const format = root.optional('format');
  if (format !== undefined && format.value !== 'csv') format.fail('must be "csv"');
  const channels = root.required('channels').list(readChannel);
  if (channels.length === 0) root.required('channels').fail('must name at least one column');
  const config: AnalyseConfig = { time: readTime(root.required('time')), channels };
  const delimiter = root.optional('delimiter')?.text();
  if (delimiter !== undefined) config.delimiter = delimiter;
  const decimalComma = root.optional('decimalComma')?.truth();
  if (decimalComma !== undefined) config.decimalComma = decimalComma;
  const gapLimitS = root.optional('gapLimitS')?.above(0);
  if (gapLimitS !== undefined) config.gapLimitS = gapLimitS;
  return config;
}

function readTime(place: Place): LogTimeSource {
  const time = place.object(['column', 'format', 'utcOffsetMinutesForNaive', 'rateHz', 'startAt']);
  const column = time.optional('column');
  const rate = time.optional('rateHz');
  if ((column === undefined) === (rate === undefined)) place.fail('must have either "column" or "rateHz"');
  if (column === undefined) {
    const source: LogTimeSource = { rateHz: time.required('rateHz').above(0) };
    const startAt = time.optional('startAt')?.text();
    return startAt === undefined ? source : { ...source, startAt };
  }
  const source: LogTimeSource = { column: column.text() };
  const format = time.optional('format');
  if (format !== undefined) source.format = format.oneOf<LogTimeFormat>(['iso', 'epoch-s', 'epoch-ms']);
  const offset = time.optional('utcOffsetMinutesForNaive')?.number();
  if (offset !== undefined) source.utcOffsetMinutesForNaive = offset;
  return source;
}

function readChannel(place: Place): AnalyseChannel {
  const channel = place.object(['column', 'unit', 'step', 'hysteresis', 'limitKn', 'details']);
  const unit = channel.optional('unit');
  if (unit !== undefined && !(typeof unit.value === 'string' && isForceUnit(unit.value))) {
    unit.fail(`must be a unit of force (${FORCE_UNITS.join(', ')})`);
  }
  const limitKn = channel.optional('limitKn')?.above(0);
  return {
    column: channel.required('column').text(),
    unit: (unit?.value ?? null) as ForceUnit | null,
    step: channel.optional('step')?.atLeast(0) ?? 0,
    hysteresis: channel.optional('hysteresis')?.atLeast(0) ?? 0,
    ...(limitKn === undefined ? {} : { limitKn }),
    details: channel.optional('details')?.list(readDetail) ?? [],
  };
}

function readDetail(place: Place): AnalyseDetail {
  const detail = place.object(['name', 'factor', 'curve', 'mean']);
  const curve = detail.required('curve').object(['segments']);
  const segments = curve.required('segments');
  const read = segments.list((item): CurveSegment => {
    const segment = item.object(['above', 'm', 'log10a']);
    return {
      above: segment.required('above').atLeast(0),
      m: segment.required('m').above(0),
      log10a: segment.required('log10a').number(),
    };
  });
  if (read.length === 0) segments.fail('must hold at least one segment');
  for (let i = 1; i < read.length; i++) {
    if (read[i].above >= read[i - 1].above) segments.fail('must run from high to low "above"');
  }
  return {
    name: detail.required('name').text(),
    factor: detail.optional('factor')?.above(0) ?? 1,
    curve: { segments: read },
    mean: readMean(detail.optional('mean')),
  };
}

function readMean(place: Place | undefined): AnalyseMeanRule {
  if (place === undefined || place.value === 'none') return { kind: 'none' };
  const mean = place.object(['kind', 'ultimate']);
  const kind = mean.required('kind').oneOf(['none', 'goodman']);
  return kind === 'none' ? { kind } : { kind, ultimate: mean.required('ultimate').above(0) };
}

/** A value of the configuration and where it stands. */
class Place {
  constructor(
    readonly value: unknown,
    private readonly path: string,
  ) {}

  fail(what: string): never {
    throw new AnalyseError(`${this.path === '' ? 'the configuration' : this.path} ${what}`);
  }

  object(known: string[]): Members {
    if (typeof this.value !== 'object' || this.value === null || Array.isArray(this.value)) {
      this.fail('must be an object');
    }
    const members = new Map(Object.entries(this.value));
    for (const name of members.keys()) {
      if (!known.includes(name)) this.fail(`has an unknown member "${name}"`);
    }
    return new Members(members, this, this.path);
  }

  list<T>(read: (item: Place) => T): T[] {
    if (!Array.isArray(this.value)) this.fail('must be a list');
    return this.value.map((item, index) => read(new Place(item, `${this.path}[${index}]`)));
  }

  text(): string {
    if (typeof this.value !== 'string' || this.value.trim() === '') this.fail('must be a text');
    return this.value;
  }

  truth(): boolean {
    if (typeof this.value !== 'boolean') this.fail('must be true or false');
    return this.value;
  }

  number(): number {
    if (typeof this.value !== 'number' || !Number.isFinite(this.value)) this.fail('must be a number');
    return this.value;
  }

  above(bound: number): number {
    const value = this.number();
    if (value <= bound) this.fail(`must be above ${bound}`);
    return value;
  }

  atLeast(bound: number): number {
    const value = this.number();
    if (value < bound) this.fail(`must be ${bound} or more`);
    return value;
  }

  oneOf<T extends string>(choices: readonly T[]): T {
    const found = choices.find((choice) => choice === this.value);
    return found ?? this.fail(`must be one of ${choices.map((choice) => `"${choice}"`).join(', ')}`);
  }
}

/** The members of an object of the configuration. */
class Members {
  constructor(
    private readonly members: Map<string, unknown>,
    private readonly owner: Place,
    private readonly path: string,
  ) {}

  required(name: string): Place {
    return this.optional(name) ?? this.owner.fail(`lacks "${name}"`);
  }

  optional(name: string): Place | undefined {
    const value = this.members.get(name);
    if (value === undefined) return undefined;
    return new Place(value, this.path === '' ? name : `${this.path}.${name}`);
  }
}
