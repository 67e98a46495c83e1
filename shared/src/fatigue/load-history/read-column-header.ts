import type { ForceUnit } from '../../units/force.js';

/** A column header taken apart. */
export interface ColumnHeader {
  /** The header without its unit. */
  name: string;
  /** The force unit it states; `unknown` when it states none or an ambiguous one. */
  unit: ForceUnit | 'unknown';
  /** What stood in the place of a unit, force or not; empty when nothing did. */
  unitText: string;
  /** Why a unit that looks like a force unit was not taken; `null` when nothing is in doubt. */
  doubt: string | null;
}

const FORCE_SPELLINGS: Readonly<Record<string, ForceUnit>> = {
  kN: 'kN',
  KN: 'kN',
  N: 'N',
  daN: 'daN',
  DaN: 'daN',
  kgf: 'kgf',
  Kgf: 'kgf',
  KGF: 'kgf',
  kp: 'kgf',
  lbf: 'lbf',
  Lbf: 'lbf',
  LBF: 'lbf',
  tf: 'tf',
};

const DOUBTFUL: Readonly<Record<string, string>> = {
  t: 'can mean metric, short or long tons',
  T: 'can mean metric, short or long tons',
  ton: 'can mean metric, short or long tons',
  tons: 'can mean metric, short or long tons',
  Ton: 'can mean metric, short or long tons',
  Tons: 'can mean metric, short or long tons',
  tonne: 'is a mass; tonne-force is written tf',
  tonnes: 'is a mass; tonne-force is written tf',
  kn: 'usually means knots; kilonewtons are written kN',
  kg: 'is a mass; kilogram-force is written kgf',
  lb: 'is a mass; pound-force is written lbf',
  lbs: 'is a mass; pound-force is written lbf',
};

/** Units of other things that stand in headers behind an underscore or a blank. */
const OTHER_UNITS = new Set([
  'm/s',
  'kts',
  'kt',
  'knots',
  'deg',
  'rad',
  'Hz',
  's',
  'ms',
  'V',
  'mV',
  'C',
  'K',
  'MPa',
  '%',
  'MBL',
  '°',
  '°C',
]);

/**
 * Name and unit of a column header: `cap_port_kN`, `cap_port [kN]`, `cap_port (kN)`, `cap_port/kN`, `cap_port kN`.
 *
 * @example readColumnHeader('cap_port [kN]') // name cap_port, unit kN
 */
export function readColumnHeader(header: string): ColumnHeader {
  const text = header.trim();
  const bracketed = /^(.*?)\s*[[({]\s*([^\])}]*?)\s*[\])}]$/.exec(text);
  if (bracketed !== null) return headerOf(bracketed[1].trim(), bracketed[2]);
  const joined = /^(.+?)[\s_/.-]+([^\s_/.-]+(?:\/s)?)$/.exec(text);
  if (joined !== null && isUnitText(joined[2])) return headerOf(joined[1], joined[2]);
  return { name: text, unit: 'unknown', unitText: '', doubt: null };
}

/** Name and unit of a column whose unit stands in a row of its own below the header. */
export function withUnitText(header: ColumnHeader, unitText: string): ColumnHeader {
  if (header.unitText !== '' || unitText.trim() === '') return header;
  return headerOf(header.name, unitText.trim().replace(/^[[({]\s*|\s*[\])}]$/g, ''));
}

/** Whether a text is spelled like a unit of force or of something else a log holds. */
export function isUnitText(text: string): boolean {
  return Object.hasOwn(FORCE_SPELLINGS, text) || Object.hasOwn(DOUBTFUL, text) || OTHER_UNITS.has(text);
}

function headerOf(name: string, unitText: string): ColumnHeader {
  const unit = Object.hasOwn(FORCE_SPELLINGS, unitText) ? FORCE_SPELLINGS[unitText] : 'unknown';
  const why = Object.hasOwn(DOUBTFUL, unitText) ? DOUBTFUL[unitText] : null;
  return { name, unit, unitText, doubt: why === null ? null : `"${unitText}" ${why}` };
}
