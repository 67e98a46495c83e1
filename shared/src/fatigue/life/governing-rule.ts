import type { CalendarRule } from './calendar-rule.js';
import { addMonths, dayNumber } from './days.js';
import { HORIZON_YEARS, ruleDate } from './rule-date.js';

/** Logged hours below which a recording is too short to plan with. */
export const MIN_LOGGED_HOURS = 30;

/** Where a part's loads come from; 'none' means it cannot be assessed. */
export type LoadBasis = 'measured' | 'mirrored' | 'in-line' | 'none';

/** The account of one detail, as far as it can be kept. */
export interface StandingDetail {
  key: string;
  /** In the trade's words: "upper terminal". */
  name: string;
  /** Why this detail has no account (unknown thread size, no usable curve); null when it has one. */
  notAssessedReason: string | null;
  /** Design damage posted so far. */
  damage: number;
  dff: number;
  designDamagePerSailingHour: number;
}

/** Everything the standing of a fitted part follows from. */
export interface PartStandingInput {
  /** Day the question is asked for, 'YYYY-MM-DD'. */
  asOfOn: string;
  kindOfWire: 'strand' | 'rod' | 'fibre';
  loadBasis: LoadBasis;
  /** Sailing hours in logs posted to this part's account. */
  loggedHours: number;
  /** The owner's plan; null when none was stated. */
  plannedHoursPerYear: number | null;
  /** True where the part sailed before its first log and nobody could say how much. */
  historyUnknown?: boolean;
  details: StandingDetail[];
  /** Null where the material has no calendar rule. */
  calendar: CalendarRule | null;
}

/** The standing of one detail. Null stands for "not to be stated", never for zero. */
export interface DetailStanding {
  key: string;
  name: string;
  notAssessedReason: string | null;
  allowanceUsed: number | null;
  remainingYears: number | null;
  replaceByOn: string | null;
  overdue: boolean;
}

/** The standing of a fitted part: how much is used, by when to replace, and by which rule. */
export interface PartStanding {
  assessment: 'assessed' | 'not-assessed' | 'calendar-only';
  notAssessedReason: string | null;
  loadBasis: LoadBasis;
  loggedHours: number;
  /** Of the worst detail. */
  allowanceUsed: number | null;
  governingDetail: string | null;
  governingDetailKey: string | null;
  /** Of the worst detail, by fatigue. */
  remainingYears: number | null;
  fatigueReplaceByOn: string | null;
  calendarReplaceByOn: string | null;
  replaceByOn: string | null;
  governingRule: 'fatigue' | 'calendar' | null;
  due: 'in-date' | 'due' | 'overdue' | 'no-date';
  /** What would give a fatigue date, one sentence each; empty when there is one. */
  wouldGiveDate: string[];
  /** Names of details that could not be assessed beside others that could. */
  notAssessedDetails: string[];
  details: DetailStanding[];
}

/**
 * The standing of a part: the account of its worst detail, the fatigue rule date, the calendar rule, and the earlier of
 * the two, named. A low allowance never lengthens the calendar.
 *
 * Months for "due" are 12: a replacement within a year is to be ordered.
 *
 * @throws RangeError for days, factors or figures the rules refuse
 */
export function partStanding(input: PartStandingInput): PartStanding {
  dayNumber(input.asOfOn);
  const calendarOn = input.calendar?.dueOn ?? null;
  const notAssessedReason = reasonNotAssessed(input);
  const assessable = notAssessedReason === null && input.kindOfWire !== 'fibre';
  const missing = assessable ? missingForDate(input) : [];
  const details = input.details.map((detail) =>
    detailStanding(detail, input, assessable, missing.length === 0),
  );
  const worst = assessable ? worstOf(details) : null;
  const fatigueOn = worst?.replaceByOn ?? null;
  const calendarGoverns = calendarOn !== null && (fatigueOn === null || calendarOn < fatigueOn);
  const replaceByOn = calendarGoverns ? calendarOn : fatigueOn;
  return {
    assessment: input.kindOfWire === 'fibre' ? 'calendar-only' : assessable ? 'assessed' : 'not-assessed',
    notAssessedReason,
    loadBasis: input.loadBasis,
    loggedHours: input.loggedHours,
    allowanceUsed: worst?.allowanceUsed ?? null,
    governingDetail: worst?.name ?? null,
    governingDetailKey: worst?.key ?? null,
    remainingYears: worst?.remainingYears ?? null,
    fatigueReplaceByOn: fatigueOn,
    calendarReplaceByOn: calendarOn,
    replaceByOn,
    governingRule: replaceByOn === null ? null : calendarGoverns ? 'calendar' : 'fatigue',
    due: dueState(input.asOfOn, replaceByOn, worst?.overdue ?? false),
    wouldGiveDate: fatigueOn === null ? wouldGiveDate(input, missing) : [],
    notAssessedDetails: assessable
      ? details.filter((detail) => detail.notAssessedReason !== null).map((detail) => detail.name)
      : [],
    details,
  };
}

function reasonNotAssessed(input: PartStandingInput): string | null {
  if (input.kindOfWire === 'fibre') {
    return 'Fibre is not assessed for fatigue: no usable curve exists. Its calendar is shown instead.';
  }
  if (input.loadBasis === 'none') return 'No recorded load belongs to this part.';
  if (input.details.every((detail) => detail.notAssessedReason !== null)) {
    const reasons = [...new Set(input.details.map((detail) => detail.notAssessedReason))];
    return input.details.length === 0
      ? 'No detail of this part is described.'
      : `No detail of this part has a usable curve. ${reasons.join(' ')}`;
  }
  if (input.historyUnknown) return 'What this part carried before its first log is not known.';
  return null;
}

function missingForDate(input: PartStandingInput): string[] {
  const missing: string[] = [];
  if (input.loggedHours < MIN_LOGGED_HOURS) {
    const more = Math.ceil(MIN_LOGGED_HOURS - input.loggedHours);
    missing.push(
      `At least ${MIN_LOGGED_HOURS} logged sailing hours: ${more} more ${more === 1 ? 'hour' : 'hours'} would do.`,
    );
  }
  if (input.plannedHoursPerYear === null) missing.push('A usage plan: the sailing hours planned per year.');
  return missing;
}

function detailStanding(
  detail: StandingDetail,
  input: PartStandingInput,
  assessable: boolean,
  datable: boolean,
): DetailStanding {
  const { key, name, notAssessedReason } = detail;
  if (!assessable || notAssessedReason !== null) {
    return {
      key,
      name,
      notAssessedReason,
      allowanceUsed: null,
      remainingYears: null,
      replaceByOn: null,
      overdue: false,
    };
  }
  const rule = ruleDate({
    asOfOn: input.asOfOn,
    damage: detail.damage,
    dff: detail.dff,
    designDamagePerSailingHour: detail.designDamagePerSailingHour,
    plannedHoursPerYear: input.plannedHoursPerYear ?? 0,
  });
  // An allowance that is already used up needs neither a plan nor more hours to be overdue.
  const dated = datable || rule.overdue;
  return {
    key,
    name,
    notAssessedReason,
    allowanceUsed: rule.allowanceUsed,
    remainingYears: dated && rule.remainingYears <= HORIZON_YEARS ? rule.remainingYears : null,
    replaceByOn: dated ? rule.replaceByOn : null,
    overdue: rule.overdue,
  };
}

/** The detail with the earliest date; among those without, the one with most of its allowance used. */
function worstOf(details: DetailStanding[]): DetailStanding | null {
  let worst: DetailStanding | null = null;
  for (const detail of details) {
    if (detail.allowanceUsed === null) continue;
    if (worst === null || isWorse(detail, worst)) worst = detail;
  }
  return worst;
}

function isWorse(one: DetailStanding, other: DetailStanding): boolean {
  const yearsOfOne = one.remainingYears ?? Infinity;
  const yearsOfOther = other.remainingYears ?? Infinity;
  if (yearsOfOne !== yearsOfOther) return yearsOfOne < yearsOfOther;
  return (one.allowanceUsed ?? 0) > (other.allowanceUsed ?? 0);
}

function dueState(asOfOn: string, replaceByOn: string | null, allowanceUsedUp: boolean): PartStanding['due'] {
  if (replaceByOn === null) return 'no-date';
  if (allowanceUsedUp || replaceByOn < asOfOn) return 'overdue';
  return replaceByOn <= addMonths(asOfOn, 12) ? 'due' : 'in-date';
}

function wouldGiveDate(input: PartStandingInput, missing: string[]): string[] {
  if (input.kindOfWire === 'fibre') return [];
  const words: string[] = [];
  if (input.loadBasis === 'none') {
    words.push('A load log with a sensor on this part, on its twin on the other side, or in line with it.');
  }
  if (input.historyUnknown)
    words.push("An estimate of the hours sailed before the first log, from the owner's record.");
  for (const detail of input.details) {
    if (
      detail.notAssessedReason !== null &&
      input.details.every((other) => other.notAssessedReason !== null)
    ) {
      words.push(`${detail.name}: ${detail.notAssessedReason}`);
    }
  }
  return [...words, ...missing];
}
