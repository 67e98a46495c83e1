import type { Preferences } from '@stayledger/shared/contracts/auth';
import { KN_PER } from '@stayledger/shared/units/force';
import dayjs, { type Dayjs } from 'dayjs';
import timezone from 'dayjs/plugin/timezone';
import utc from 'dayjs/plugin/utc';

dayjs.extend(utc);
dayjs.extend(timezone);

type ForceUnit = Preferences['forceUnit'];
type LengthUnit = Preferences['lengthUnit'];

/** Metres in one of each unit (international foot). */
const M_PER_LENGTH_UNIT: Record<LengthUnit, number> = { m: 1, ft: 0.3048 };

const FORCE_UNIT_NAMES: Record<ForceUnit, string> = {
  kN: 'kilonewton (kN)',
  kgf: 'kilogram-force (kgf)',
  daN: 'decanewton (daN)',
  lbf: 'pound-force (lbf)',
  tf: 'tonne-force (tf)',
};

const NO_VALUE = '–';
/** "14 Mar 2027", held together by no-break spaces. */
const DAY_FORMAT = 'D[\u00a0]MMM[\u00a0]YYYY';

export interface Formatter {
  readonly forceUnit: ForceUnit;
  readonly lengthUnit: LengthUnit;
  /** A plain number with a fixed count of decimals and thin grouping. */
  number: (value: number | null | undefined, decimals?: number) => string;
  /** A number to so many significant figures, never in exponent form. */
  significant: (value: number | null | undefined, figures?: number) => string;
  /** Very large or very small amounts: 3.2 × 10^-6 written with superscripts. */
  scientific: (value: number | null | undefined, figures?: number) => string;
  /** 10⁶ for a whole power of ten, else as `scientific`: for ticks of logarithmic axes. */
  powerOfTen: (value: number) => string;
  force: (kn: number | null | undefined) => string;
  /** The figure alone, for columns whose header names the unit. */
  forceFigure: (kn: number | null | undefined) => string;
  forceToKn: (value: number) => number;
  forceFromKn: (kn: number) => number;
  length: (m: number | null | undefined) => string;
  lengthToM: (value: number) => number;
  lengthFromM: (m: number) => number;
  diameter: (mm: number | null | undefined) => string;
  hours: (hours: number | null | undefined) => string;
  bytes: (bytes: number | null | undefined) => string;
  /** "67 %"; above the whole allowance "1.4 times its allowance". */
  allowance: (ratio: number | null | undefined) => string;
  percent: (ratio: number | null | undefined, decimals?: number) => string;
  /** "14 Mar 2027". */
  day: (on: string | null | undefined) => string;
  /** Within twelve months the day; beyond, season and year ("spring 2029"). */
  dueDay: (on: string | null | undefined, todayOn: string, zone?: string) => string;
  /** An instant in a zone: "14 Mar 2027, 16:05". */
  instant: (at: string | number | null | undefined, zone: string) => string;
  /** The figure a person typed, decimal comma or point; null when it is not one. */
  parseNumber: (text: string) => number | null;
}

/** All numbers, units and dates a person reads or types go through here. */
export function createFormatter(preferences: Preferences): Formatter {
  const decimalMark = preferences.decimalComma ? ',' : '.';
  const knPerUnit = KN_PER[preferences.forceUnit];
  const mPerUnit = M_PER_LENGTH_UNIT[preferences.lengthUnit];

  const number: Formatter['number'] = (value, decimals = 0) => {
    if (value === null || value === undefined || Number.isNaN(value)) return NO_VALUE;
    if (!Number.isFinite(value)) return value > 0 ? 'no limit' : NO_VALUE;
    const [whole, fraction] = Math.abs(value).toFixed(decimals).split('.');
    // Narrow no-break spaces group without looking like either a decimal point or a decimal comma.
    const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, '\u202f') : whole;
    const isZero = !/[1-9]/.test(whole + (fraction ?? ''));
    return `${value < 0 && !isZero ? '\u2212' : ''}${grouped}${fraction ? decimalMark + fraction : ''}`;
  };
  const significant: Formatter['significant'] = (value, figures = 3) => {
    if (value === null || value === undefined || !Number.isFinite(value)) return number(value);
    if (value === 0) return '0';
    const rounded = Number(value.toPrecision(figures));
    const magnitude = Math.floor(Math.log10(Math.abs(rounded)));
    return number(rounded, Math.max(0, figures - 1 - magnitude));
  };
  const scientific: Formatter['scientific'] = (value, figures = 2) => {
    if (value === null || value === undefined || !Number.isFinite(value)) return number(value);
    const magnitude = Math.abs(value);
    if (value === 0 || (magnitude >= 1e-3 && magnitude < 1e5))
      return significant(value, Math.max(figures, 3));
    const [mantissa, exponent] = value.toExponential(figures - 1).split('e');
    return `${number(Number(mantissa), figures - 1)}\u202f×\u202f10${superscript(Number(exponent))}`;
  };
  const forceFigure: Formatter['forceFigure'] = (kn) => {
    if (kn === null || kn === undefined) return NO_VALUE;
    const value = kn / knPerUnit;
    return number(value, Math.abs(value) >= 100 ? 0 : Math.abs(value) >= 10 ? 1 : 2);
  };
  const withUnit = (figure: string, unit: string) =>
    figure === NO_VALUE ? figure : `${figure}\u00a0${unit}`;
  const percent: Formatter['percent'] = (ratio, decimals) => {
    if (ratio === null || ratio === undefined || Number.isNaN(ratio)) return NO_VALUE;
    const value = ratio * 100;
    if (decimals === undefined && value > 0 && value < 0.1) return `under ${number(0.1, 1)}\u00a0%`;
    return `${number(value, decimals ?? (value < 10 ? 1 : 0))}\u00a0%`;
  };

  return {
    forceUnit: preferences.forceUnit,
    lengthUnit: preferences.lengthUnit,
    number,
    significant,
    scientific,
    powerOfTen: (value) => {
      const exponent = Math.round(Math.log10(value));
      return value === Number(`1e${exponent}`) ? `10${superscript(exponent)}` : scientific(value);
    },
    force: (kn) => withUnit(forceFigure(kn), preferences.forceUnit),
    forceFigure,
    forceToKn: (value) => value * knPerUnit,
    forceFromKn: (kn) => kn / knPerUnit,
    length: (m) =>
      withUnit(number(m === null || m === undefined ? null : m / mPerUnit, 1), preferences.lengthUnit),
    lengthToM: (value) => value * mPerUnit,
    lengthFromM: (m) => m / mPerUnit,
    diameter: (mm) => withUnit(mm === null || mm === undefined ? NO_VALUE : number(mm, decimalsOf(mm)), 'mm'),
    hours: (hours) =>
      withUnit(number(hours, hours !== null && hours !== undefined && hours > 0 && hours < 10 ? 1 : 0), 'h'),
    bytes: (bytes) => {
      if (bytes === null || bytes === undefined) return NO_VALUE;
      const step = bytes < 1e3 ? 0 : bytes < 1e6 ? 1 : bytes < 1e9 ? 2 : 3;
      return withUnit(number(bytes / 1e3 ** step, step === 0 ? 0 : 1), ['bytes', 'kB', 'MB', 'GB'][step]);
    },
    allowance: (ratio) => {
      if (ratio === null || ratio === undefined) return NO_VALUE;
      return ratio > 1 ? `${number(ratio, ratio < 10 ? 1 : 0)} times its allowance` : percent(ratio);
    },
    percent,
    day: (on) => calendarDay(on)?.format(DAY_FORMAT) ?? NO_VALUE,
    dueDay: (on, todayOn, zone = '') => {
      const due = calendarDay(on);
      const today = calendarDay(todayOn);
      if (!due || !today) return NO_VALUE;
      if (!due.isAfter(today.add(12, 'month'))) return due.format(DAY_FORMAT);
      return seasonOf(due.year(), due.month() + 1, zone);
    },
    instant: (at, zone) => {
      if (at === null || at === undefined) return NO_VALUE;
      return dayjs.utc(at).tz(zone).format(`${DAY_FORMAT}, HH:mm`);
    },
    parseNumber,
  };
}

export function forceUnitName(unit: ForceUnit): string {
  return FORCE_UNIT_NAMES[unit];
}

/**
 * Reads a typed figure. One comma or point is the decimal mark; spaces group. A figure such as "1,234.5" that holds both
 * takes the last of them as the decimal mark. Anything else is not a number: guessing would change a load.
 */
export function parseNumber(text: string): number | null {
  const compact = text.replace(/[\s\u00a0\u202f']/g, '').replace('\u2212', '-');
  if (!/^[+-]?[\d.,]+$/.test(compact)) return null;
  const marks = compact.replace(/[^.,]/g, '');
  let plain = compact;
  if (marks.length > 1) {
    const decimal = marks[marks.length - 1];
    const grouping = decimal === ',' ? '.' : ',';
    if (marks.indexOf(decimal) !== marks.length - 1) return null;
    const whole = compact.slice(0, compact.lastIndexOf(decimal));
    if (!/^[+-]?\d{1,3}([.,]\d{3})+$/.test(whole)) return null;
    plain = compact.split(grouping).join('');
  }
  plain = plain.replace(',', '.');
  return /^[+-]?(\d+\.?\d*|\.\d+)$/.test(plain) ? Number(plain) : null;
}

/** A calendar day has no zone: it is read and shown in UTC, so that no offset can move it. */
function calendarDay(on: string | null | undefined): Dayjs | null {
  return on && /^\d{4}-\d{2}-\d{2}$/.test(on) ? dayjs.utc(on) : null;
}

/** Zones whose seasons run the other way; a zone we do not know is taken for the northern half. */
const SOUTHERN_ZONES =
  /^(Antarctica\/|Australia\/|Pacific\/(Auckland|Chatham|Fiji|Tongatapu|Apia|Noumea|Norfolk|Tahiti)|Africa\/(Johannesburg|Maputo|Windhoek|Harare)|America\/(Argentina\/|Buenos_Aires|Sao_Paulo|Santiago|Punta_Arenas|Montevideo|Lima|Asuncion)|Atlantic\/(Stanley|South_Georgia|St_Helena)|Indian\/(Mauritius|Reunion))/;

function seasonOf(year: number, month: number, zone: string): string {
  const north = ['winter', 'spring', 'summer', 'autumn'];
  const index = Math.floor((month % 12) / 3);
  const season = SOUTHERN_ZONES.test(zone) ? north[(index + 2) % 4] : north[index];
  // The season that begins in December is named by both of its years.
  if (index !== 0) return `${season}\u00a0${year}`;
  const first = month === 12 ? year : year - 1;
  return `${season}\u00a0${first}/${String((first + 1) % 100).padStart(2, '0')}`;
}

function decimalsOf(value: number): number {
  const text = String(Math.round(value * 100) / 100);
  return text.includes('.') ? text.split('.')[1].length : 0;
}

function superscript(value: number): string {
  const digits = '⁰¹²³⁴⁵⁶⁷⁸⁹';
  return [...String(value)]
    .map((character) => (character === '-' ? '⁻' : digits[Number(character)]))
    .join('');
}
