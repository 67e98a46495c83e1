import { addMonths, dayNumber, DAYS_PER_YEAR } from '../fatigue/life/days.js';
import { positionKind, positionLabel } from '../rig/positions.js';
import type { Side } from '../rig/positions.js';
import { groupParts } from './group-parts.js';
import type { PartWork, PlanPart } from './group-parts.js';
import type { PlanDecisions, PlanInput, PlanTask, VisitKind, WorkTerms } from './plan-input.js';
import { planWindows } from './plan-windows.js';
import type { DaySpan } from './plan-windows.js';
import { yardSeasons } from './yard-seasons.js';
import type { YardTerms } from './yard-terms.js';

/** A fitted part of the register with the date that stands for it. */
export interface RegisterPart {
  partId: string;
  /** Kind of its position, as in shared/rig/positions. */
  kind: string;
  side: Side;
  mast: string;
  label: string;
  kindOfWire: 'strand' | 'rod' | 'fibre';
  diameterMm: number;
  /** Null: not known. */
  lengthM: number | null;
  /** Null: not known. */
  fittedOn: string | null;
  /** Null: no date stands for it. */
  replaceByOn: string | null;
}

/** What the plan of one vessel is made from. */
export interface PlanBasis {
  asOfOn: string;
  horizonYears: number;
  currency: string;
  terms: YardTerms;
  parts: readonly RegisterPart[];
  /** When the vessel cannot come: charter, passage, lay-up elsewhere. */
  absences: readonly DaySpan[];
  /** Ids of seasons in which the yard has no room left. */
  fullSeasonIds: readonly string[];
  decisions: PlanDecisions;
}

/** The input of a plan, what windows are called, and what a person should know about how it was come by. */
export interface VesselPlanInput {
  input: PlanInput;
  windowLabels: { id: string; label: string }[];
  /** One sentence each. */
  notes: string[];
}

/** Length taken where nobody measured a part, m. An engineering choice without a source. */
export const ASSUMED_LENGTH_M = 12;
/** Years until the part that follows is due where the life of this one is not known. An engineering choice. */
export const ASSUMED_LIFE_YEARS = 10;
/** Working with the mast up takes so many times as long. An engineering choice without a source. */
export const ALOFT_TIME_FACTOR = 1.5;
/** The task that looks over the whole rig. */
export const RIG_INSPECTION_ID = 'inspect:rig';

const LEAST_LIFE_DAYS = 365;

/**
 * The register, the firm's terms and the yard's calendar as the input of a plan. Port and starboard of a pair go together;
 * running rigging is left out; a part without a date is left out and named by the plan.
 *
 * @throws RangeError for days that are not calendar days and for spans that end before they begin
 */
export function vesselPlanInput(basis: PlanBasis): VesselPlanInput {
  const { asOfOn, terms } = basis;
  const horizonEndOn = addMonths(asOfOn, 12 * basis.horizonYears);
  const seasons = yardSeasons(terms.seasons, asOfOn, horizonEndOn);
  const open = seasons.filter(({ id }) => !basis.fullSeasonIds.includes(id));
  const { windows, lostSeasonIds } = planWindows(open, terms.closures, basis.absences);
  const labelOf = new Map(seasons.map(({ id, label }) => [id, label]));

  const standing = basis.parts.filter(({ kind }) => positionKind(kind)?.standing !== false);
  const grouped = groupParts(
    standing.map((part) => planPartOf(part, terms)),
    { together: pairsOf(standing), takesAlong: [] },
  );
  const decisions = decisionsAbout(basis.decisions, new Set(windows.map(({ id }) => id)));
  const inspection = inspectionTask(standing, terms, asOfOn);
  return {
    input: {
      asOfOn,
      horizonEndOn,
      currency: basis.currency,
      visitTerms: terms.visits,
      contingencyShare: terms.contingencyShare,
      orderMarginDays: terms.orderMarginDays,
      windows,
      tasks: inspection === null ? grouped.tasks : [...grouped.tasks, inspection],
      decisions,
    },
    windowLabels: windows.map(({ id }) => ({ id, label: labelOf.get(id)! })),
    notes: [
      ...grouped.problems,
      ...lengthNote(standing),
      ...namedSeasons('The yard has no room left in', basis.fullSeasonIds, labelOf),
      ...namedSeasons('Closures and absences leave no window in', lostSeasonIds, labelOf),
    ],
  };
}

function planPartOf(part: RegisterPart, terms: YardTerms): PlanPart {
  const name = positionLabel(part.kind, 'centre', part.mast);
  return {
    id: part.partId,
    name: part.label,
    groupName: part.side === 'centre' ? part.label : `${name}, both sides`,
    standing: 'dated',
    replaceByOn: part.replaceByOn,
    confirmByOn: null,
    replacement: replacementOf(part, terms),
    inspection: null,
  };
}

function replacementOf(part: RegisterPart, { replacements }: YardTerms): PartWork {
  const price = replacements[part.kindOfWire];
  const metres = part.lengthM ?? ASSUMED_LENGTH_M;
  const costMinor = Math.round(price.perPartMinor + price.perMetreMillimetreMinor * metres * part.diameterMm);
  const mastOut: WorkTerms = { costMinor, hours: price.hours };
  const work: Partial<Record<VisitKind, WorkTerms>> = {
    'mast-out-afloat': mastOut,
    'mast-out-ashore': mastOut,
  };
  if (price.aloft) work.aloft = { costMinor, hours: price.hours * ALOFT_TIME_FACTOR };
  return { againAfterDays: lifeDaysOf(part), terms: work, leadDays: price.leadDays };
}

/** The part that follows is taken to last as long as this one from fitting to its date. */
function lifeDaysOf({ fittedOn, replaceByOn }: RegisterPart): number {
  if (fittedOn === null || replaceByOn === null) return Math.round(ASSUMED_LIFE_YEARS * DAYS_PER_YEAR);
  return Math.max(LEAST_LIFE_DAYS, dayNumber(replaceByOn) - dayNumber(fittedOn));
}

/** Parts of one kind on one mast: port with starboard. */
function pairsOf(parts: readonly RegisterPart[]): string[][] {
  const pairs = new Map<string, string[]>();
  for (const { partId, kind, mast, side } of parts) {
    if (side === 'centre') continue;
    const key = JSON.stringify([mast, kind]);
    pairs.set(key, [...(pairs.get(key) ?? []), partId]);
  }
  return [...pairs.values()].filter((ids) => ids.length > 1);
}

function inspectionTask(parts: readonly RegisterPart[], terms: YardTerms, asOfOn: string): PlanTask | null {
  if (terms.inspectionEveryMonths === 0 || parts.length === 0) return null;
  const { costMinor, hours } = terms.inspection;
  return {
    id: RIG_INSPECTION_ID,
    name: 'Inspection of the whole rig',
    partIds: parts.map(({ partId }) => partId),
    action: 'inspect',
    ground: 'inspection-interval',
    dueOn: addMonths(asOfOn, terms.inspectionEveryMonths),
    againAfterDays: Math.round((terms.inspectionEveryMonths / 12) * DAYS_PER_YEAR),
    terms: {
      aloft: { costMinor, hours },
      'mast-out-afloat': { costMinor, hours },
      'mast-out-ashore': { costMinor, hours },
    },
    leadDays: 0,
    alsoDoneBy: [],
    needs: [],
  };
}

/** Decisions about windows that have passed, or are no more, settle nothing. */
function decisionsAbout(decisions: PlanDecisions, windowIds: ReadonlySet<string>): PlanDecisions {
  const isThere = ({ windowId }: { windowId: string }): boolean => windowIds.has(windowId);
  return {
    locked: decisions.locked.filter(isThere),
    barred: decisions.barred.filter(isThere),
    pinned: decisions.pinned.filter(isThere),
    kept: decisions.kept.filter(isThere),
  };
}

function lengthNote(parts: readonly RegisterPart[]): string[] {
  const count = parts.filter(({ lengthM }) => lengthM === null).length;
  if (count === 0) return [];
  const words = count === 1 ? 'One part has no length' : `${count} parts have no length`;
  return [`${words} in the register: ${ASSUMED_LENGTH_M} m is taken for its price. Estimate, not measured.`];
}

function namedSeasons(words: string, ids: readonly string[], labels: ReadonlyMap<string, string>): string[] {
  const names = ids.flatMap((id) => labels.get(id) ?? []);
  return names.length === 0 ? [] : [`${words} ${names.join(', ')}.`];
}
