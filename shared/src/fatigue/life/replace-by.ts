import { addMonths, dayNumber } from './days.js';

/** Rules that can end the time of a part. */
export type ReplaceByRule =
  | 'fatigue-rule'
  | 'fatigue-reliability'
  | 'calendar'
  | 'distance'
  | 'inspection-finding'
  | 'policy'
  | 'class'
  | 'flag'
  | 'builder';

/** A day by which one rule wants the part replaced. */
export interface DatedRule {
  rule: ReplaceByRule;
  on: string;
  words: string;
}

/** An age, survey or use limit of somebody else, shown as theirs. */
export interface OutsideLimit {
  by: 'policy' | 'class' | 'flag' | 'builder';
  /** Whose it is: "Hull policy 2026, clause 4". */
  name: string;
  dueOn: string;
}

/** What an inspection found. */
export type InspectionFinding =
  /** A broken wire, crack, bent screw or rust streak at a terminal ends the part, whatever its allowance. */
  | { kind: 'ends-part'; foundOn: string; words: string }
  /** The inspector gives the part until a day. */
  | { kind: 'cap'; foundOn: string; replaceByOn: string; words: string };

/** An event on the load path that no inspection has answered yet. */
export interface OpenIncident {
  happenedOn: string;
  /** "grounding", "load above half the assembly's strength". */
  words: string;
}

/** Everything that can end the time of a part. Null: that rule names no day. */
export interface ReplaceByInput {
  asOfOn: string;
  /** (A) and (B) of fatigue; null where there is no date. */
  fatigueRuleOn: string | null;
  fatigueReliabilityOn: string | null;
  calendarOn: string | null;
  distanceOn: string | null;
  limits: readonly OutsideLimit[];
  findings: readonly InspectionFinding[];
  incidents: readonly OpenIncident[];
  /** True where the fatigue date hangs on an unconfirmed estimate, see provisionalRange. */
  fatigueProvisional: boolean;
}

/** The replace-by date of a part: the earliest rule, named. */
export interface ReplaceBy {
  /** 'suspended': no fatigue date until an inspection; 'ended': a finding ended the part; 'undated': no rule names a day. */
  state: 'dated' | 'suspended' | 'ended' | 'undated';
  /** Null while suspended or undated. While suspended the rules that still run stand in `rules`. */
  replaceByOn: string | null;
  governingRule: ReplaceByRule | null;
  due: 'in-date' | 'due' | 'overdue' | 'no-date';
  /** What is asked for first: a provisional fatigue date that governs asks for an inspection, not for a replacement. */
  asks: 'replace' | 'inspect-or-confirm' | 'inspect-after-incident' | 'nothing';
  words: string;
  /** All rules that name a day, earliest first. */
  rules: DatedRule[];
}

/** A replacement within a year is to be ordered. */
const DUE_MONTHS = 12;

const ORDER: readonly ReplaceByRule[] = [
  'inspection-finding',
  'fatigue-rule',
  'fatigue-reliability',
  'calendar',
  'distance',
  'builder',
  'class',
  'flag',
  'policy',
];

/**
 * Replace-by of a part: the earliest of fatigue (rule and reliability date), calendar and distance of its material, what
 * an inspection found, and the limits of policy, class, flag or builder as their own condition. A low fatigue figure
 * never lengthens any other rule.
 *
 * A finding that ends the part comes before everything. An incident that no inspection has answered takes every
 * fatigue date away: the answer is "suspended", without a day, and the rules that still run are listed.
 *
 * @throws RangeError for a day that is not a calendar day
 */
export function replaceBy(input: ReplaceByInput): ReplaceBy {
  dayNumber(input.asOfOn);
  const ended = input.findings
    .filter((finding) => finding.kind === 'ends-part')
    .sort(byFound)
    .at(0);
  const suspended = input.incidents.length > 0;
  const rules = datedRules(input, suspended);
  if (ended !== undefined) {
    dayNumber(ended.foundOn);
    return {
      state: 'ended',
      replaceByOn: ended.foundOn < input.asOfOn ? ended.foundOn : input.asOfOn,
      governingRule: 'inspection-finding',
      due: 'overdue',
      asks: 'replace',
      words: `Replace now: ${ended.words}, found on ${ended.foundOn}. It ends the part whatever its allowance.`,
      rules,
    };
  }
  if (suspended) {
    const [incident] = [...input.incidents].sort((one, other) =>
      one.happenedOn < other.happenedOn ? 1 : -1,
    );
    dayNumber(incident.happenedOn);
    return {
      state: 'suspended',
      replaceByOn: null,
      governingRule: null,
      due: rules.some(({ on }) => on < input.asOfOn) ? 'overdue' : 'no-date',
      asks: 'inspect-after-incident',
      words: `Suspended: ${incident.words} on ${incident.happenedOn}. No fatigue date is given until an inspection is recorded.`,
      rules,
    };
  }
  const first = rules.at(0);
  if (first === undefined) {
    return {
      state: 'undated',
      replaceByOn: null,
      governingRule: null,
      due: 'no-date',
      asks: 'nothing',
      words: 'No rule names a day for this part.',
      rules,
    };
  }
  const provisional = input.fatigueProvisional && first.rule.startsWith('fatigue');
  return {
    state: 'dated',
    replaceByOn: first.on,
    governingRule: first.rule,
    due: dueState(input.asOfOn, first.on, provisional),
    asks: provisional ? 'inspect-or-confirm' : 'replace',
    words: provisional
      ? `Inspect or confirm by ${first.on}: the fatigue date hangs on an estimate nobody has confirmed.`
      : first.words,
    rules,
  };
}

function datedRules(input: ReplaceByInput, suspended: boolean): DatedRule[] {
  const rules: DatedRule[] = [];
  const add = (rule: ReplaceByRule, on: string | null, words: string): void => {
    if (on === null) return;
    dayNumber(on);
    rules.push({ rule, on, words });
  };
  if (!suspended) {
    add('fatigue-rule', input.fatigueRuleOn, 'Fatigue: its allowance is used up by then.');
    add(
      'fatigue-reliability',
      input.fatigueReliabilityOn,
      'Fatigue: the chance of having failed reaches its limit by then.',
    );
  }
  add('calendar', input.calendarOn, 'The age at which its material is replaced.');
  add('distance', input.distanceOn, 'The distance after which its material is replaced.');
  for (const finding of input.findings) {
    if (finding.kind === 'cap')
      add('inspection-finding', finding.replaceByOn, `Inspection of ${finding.foundOn}: ${finding.words}.`);
  }
  for (const { by, name, dueOn } of input.limits) add(by, dueOn, `A condition of others: ${name}.`);
  return rules.sort((one, other) =>
    one.on === other.on ? ORDER.indexOf(one.rule) - ORDER.indexOf(other.rule) : one.on < other.on ? -1 : 1,
  );
}

function byFound(one: { foundOn: string }, other: { foundOn: string }): number {
  return one.foundOn < other.foundOn ? -1 : 1;
}

/** A provisional date is never called overdue: what is due is the inspection. */
function dueState(asOfOn: string, on: string, provisional: boolean): ReplaceBy['due'] {
  if (on < asOfOn) return provisional ? 'due' : 'overdue';
  return on <= addMonths(asOfOn, DUE_MONTHS) ? 'due' : 'in-date';
}
