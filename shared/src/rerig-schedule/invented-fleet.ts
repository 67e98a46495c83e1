import { addMonths } from '../fatigue/life/days.js';
import type { FirmInput } from './firm-input.js';
import { DEFAULT_CONTINGENCY_SHARE, DEFAULT_ORDER_MARGIN_DAYS, NO_DECISIONS } from './plan-input.js';
import type { PlanInput, PlanTask, PlanWindow, VisitKind, WorkTerms } from './plan-input.js';

/** What an invented vessel is made from. Every figure of it is invented. */
export interface InventedVesselSettings {
  asOfOn: string;
  /** Evenly from 0 to 1, the only source of chance. */
  random: () => number;
  taskCount: number;
  windowCount: number;
  /** Two windows a year: the winter lay-up and the fitting-out. */
  windowsFromOn: string;
}

interface Pattern {
  name: string;
  action: 'replace' | 'inspect';
  /** Years between doings, least and most. */
  years: [least: number, most: number];
  /** Cost in whole currency units and hours per kind, before the vessel's size is applied. */
  terms: Partial<Record<VisitKind, [cost: number, hours: number]>>;
  leadDays: number;
  alsoDoneBy?: string;
}

const OUT: VisitKind[] = ['mast-out-afloat', 'mast-out-ashore'];

function inAnyVisit(cost: number, hoursAloft: number, hoursOut: number): Pattern['terms'] {
  return {
    aloft: [cost, hoursAloft],
    'mast-out-afloat': [cost, hoursOut],
    'mast-out-ashore': [cost, hoursOut],
  };
}

function mastOut(cost: number, hours: number): Pattern['terms'] {
  return Object.fromEntries(OUT.map((kind) => [kind, [cost, hours] as [number, number]]));
}

const PATTERNS: Pattern[] = [
  { name: 'cap shrouds', action: 'replace', years: [7, 12], terms: mastOut(2400, 14), leadDays: 56 },
  { name: 'rig check aloft', action: 'inspect', years: [2, 3], terms: inAnyVisit(180, 4, 3), leadDays: 0 },
  { name: 'forestay', action: 'replace', years: [6, 10], terms: mastOut(1500, 10), leadDays: 56 },
  { name: 'lower shrouds', action: 'replace', years: [7, 12], terms: inAnyVisit(1300, 14, 8), leadDays: 42 },
  {
    name: 'mast on trestles, opened up',
    action: 'inspect',
    years: [5, 6],
    terms: mastOut(700, 16),
    leadDays: 0,
  },
  { name: 'backstay', action: 'replace', years: [7, 12], terms: inAnyVisit(900, 8, 5), leadDays: 42 },
  { name: 'fibre lashings', action: 'replace', years: [3, 5], terms: inAnyVisit(220, 5, 3), leadDays: 21 },
  { name: 'intermediate shrouds', action: 'replace', years: [7, 12], terms: mastOut(1100, 9), leadDays: 42 },
  { name: 'bobstay', action: 'replace', years: [5, 8], terms: inAnyVisit(600, 5, 5), leadDays: 42 },
  {
    name: 'chainplates pulled',
    action: 'inspect',
    years: [9, 12],
    terms: { 'mast-out-ashore': [1600, 24] },
    leadDays: 0,
  },
  { name: 'running backstays', action: 'replace', years: [4, 7], terms: inAnyVisit(800, 6, 5), leadDays: 28 },
  { name: 'turnbuckles', action: 'replace', years: [12, 18], terms: inAnyVisit(1900, 12, 8), leadDays: 35 },
  { name: 'spreader ends', action: 'inspect', years: [3, 5], terms: inAnyVisit(150, 4, 2), leadDays: 0 },
  { name: 'inner forestay', action: 'replace', years: [7, 12], terms: inAnyVisit(850, 8, 5), leadDays: 42 },
];

/**
 * An invented vessel with an invented re-rig plan to be solved, for tests and benchmarks. Not a record of any vessel.
 *
 * @param settings see {@link InventedVesselSettings}
 */
export function inventedVessel(settings: InventedVesselSettings): PlanInput {
  const { asOfOn, random, taskCount, windowCount } = settings;
  const size = 0.7 + 1.1 * random();
  const windows = inventedWindows(settings.windowsFromOn, windowCount);
  const tasks = Array.from({ length: taskCount }, (_, at): PlanTask => {
    const pattern = PATTERNS[at % PATTERNS.length];
    const years = pattern.years[0] + (pattern.years[1] - pattern.years[0]) * random();
    const leftMonths = Math.round(12 * years * (0.06 + 0.94 * random()));
    return {
      id: `task-${at}`,
      name: pattern.name,
      partIds: [`part-${at}`],
      action: pattern.action,
      ground: pattern.action === 'replace' ? 'replace-by' : 'inspection-interval',
      dueOn: addMonths(asOfOn, leftMonths),
      againAfterDays: Math.round(365.25 * years),
      terms: Object.fromEntries(
        Object.entries(pattern.terms).map(([kind, [cost, hours]]): [string, WorkTerms] => [
          kind,
          { costMinor: Math.round(cost * size * 100), hours: Math.round(hours * size) },
        ]),
      ),
      leadDays: pattern.leadDays,
      alsoDoneBy: [],
      needs: [],
    };
  });
  return {
    asOfOn,
    horizonEndOn: addMonths(settings.windowsFromOn, 6 * windowCount),
    currency: 'EUR',
    visitTerms: {
      aloft: { costMinor: Math.round(35_000 * size), hours: 3 },
      'mast-out-afloat': { costMinor: Math.round(240_000 * size), hours: Math.round(14 * size) },
      'mast-out-ashore': { costMinor: Math.round(330_000 * size), hours: Math.round(20 * size) },
    },
    contingencyShare: DEFAULT_CONTINGENCY_SHARE,
    orderMarginDays: DEFAULT_ORDER_MARGIN_DAYS,
    windows,
    tasks,
    decisions: NO_DECISIONS,
  };
}

function inventedWindows(fromOn: string, count: number): PlanWindow[] {
  return Array.from({ length: count }, (_, at): PlanWindow => {
    const opensOn = addMonths(fromOn, 6 * at);
    const winter = at % 2 === 0;
    return {
      id: `w${String(at).padStart(2, '0')}`,
      opensOn,
      closesOn: addMonths(opensOn, winter ? 5 : 2),
      kinds: winter ? ['aloft', 'mast-out-afloat', 'mast-out-ashore'] : ['aloft', 'mast-out-afloat'],
    };
  });
}

/**
 * An invented firm: vessels of {@link inventedVessel}, each away in some of the yard's windows, and a yard with berths and
 * hours per window in proportion to their number.
 *
 * @param settings as for one vessel, with the number of vessels and the room per vessel and window
 */
export function inventedFirm(
  settings: InventedVesselSettings & {
    vesselCount: number;
    hoursPerVessel: number;
    berthsPerVessel: number;
    lateDayCostMinor: number;
  },
): FirmInput {
  const { random, vesselCount } = settings;
  const vessels = Array.from({ length: vesselCount }, (_, at) => {
    const input = inventedVessel(settings);
    // One window in eight is lost to a charter, a passage or a lay-up elsewhere.
    const windows = input.windows.filter(() => random() >= 0.125);
    return { vesselId: `vessel-${at}`, name: `Vessel ${at}`, input: { ...input, windows } };
  });
  return {
    lateDayCostMinor: settings.lateDayCostMinor,
    vessels,
    windows: inventedWindows(settings.windowsFromOn, settings.windowCount).map(({ id, kinds }) => ({
      id,
      riggerHours: Math.round(vesselCount * settings.hoursPerVessel),
      berths: Object.fromEntries(
        kinds
          .filter((kind) => kind !== 'aloft')
          .map((kind) => [kind, Math.max(1, Math.round(vesselCount * settings.berthsPerVessel))]),
      ),
    })),
  };
}
