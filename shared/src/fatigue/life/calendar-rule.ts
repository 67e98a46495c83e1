import { addMonths, dayNumber } from './days.js';
import type { ReplacementRule, UsageClass } from './replacement-rule.js';

/** What the calendar of a part may run from, best first. */
export interface CalendarRuleInput {
  rule: Pick<ReplacementRule, 'name' | 'years'>;
  /** 'general' unless the owner or surveyor states another use. */
  usageClass?: UsageClass;
  /** Day the part was fitted, null when not known. */
  fittedOn: string | null;
  /** Day of the oldest document that shows the part, null when there is none. */
  oldestDocumentOn?: string | null;
  /** Year the vessel was built, null when not known. */
  buildYear: number | null;
}

/** Result of the calendar rule of a material. */
export interface CalendarRule {
  /** Day by which to replace; null when nothing is known to run from. */
  dueOn: string | null;
  runsFromOn: string | null;
  basis: 'fitted-on' | 'oldest-document' | 'build-year' | 'unknown';
  years: number;
  /** One sentence for the person who asks why. */
  words: string;
}

/**
 * The calendar rule: so many years from the day a part was fitted. Where that day is not known the calendar runs from
 * the build year (its first day, so that the part is never taken for younger than it is) or from the oldest document,
 * whichever is earlier.
 *
 * @throws RangeError for a day that is not a calendar day or a build year that is not a whole year
 * Source: rules of thumb of the trade, in the reference data with their provenance.
 */
export function calendarRule(input: CalendarRuleInput): CalendarRule {
  const usageClass = input.usageClass ?? 'general';
  const years = input.rule.years[usageClass];
  const start = startOfCalendar(input);
  if (start === null) {
    return {
      dueOn: null,
      runsFromOn: null,
      basis: 'unknown',
      years,
      words: `${input.rule.name}: ${years} years, but neither the day of fitting nor the build year is known. Either one would give a date.`,
    };
  }
  const dueOn = addMonths(start.on, Math.round(years * 12));
  return {
    dueOn,
    runsFromOn: start.on,
    basis: start.basis,
    years,
    words: sentence(input.rule.name, years, start),
  };
}

interface CalendarStart {
  on: string;
  basis: 'fitted-on' | 'oldest-document' | 'build-year';
}

function startOfCalendar(input: CalendarRuleInput): CalendarStart | null {
  if (input.fittedOn !== null) {
    dayNumber(input.fittedOn);
    return { on: input.fittedOn, basis: 'fitted-on' };
  }
  const documentOn = input.oldestDocumentOn ?? null;
  if (documentOn !== null) dayNumber(documentOn);
  const builtOn = input.buildYear === null ? null : firstDayOf(input.buildYear);
  if (builtOn !== null && (documentOn === null || builtOn <= documentOn))
    return { on: builtOn, basis: 'build-year' };
  return documentOn === null ? null : { on: documentOn, basis: 'oldest-document' };
}

function firstDayOf(year: number): string {
  if (!Number.isInteger(year) || year < 1000 || year > 9999) {
    throw new RangeError(`A build year must be a whole year such as 1998, not ${year}.`);
  }
  return `${year}-01-01`;
}

function sentence(name: string, years: number, start: CalendarStart): string {
  switch (start.basis) {
    case 'fitted-on':
      return `${name}: ${years} years from the day it was fitted, ${start.on}.`;
    case 'oldest-document':
      return `${name}: ${years} years. The day of fitting is not known; the calendar runs from the oldest document, ${start.on}.`;
    case 'build-year':
      return `${name}: ${years} years. The day of fitting is not known; the calendar runs from the build year, ${start.on.slice(0, 4)}.`;
  }
}
