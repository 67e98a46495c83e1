import type { TERMINALS } from '@stayledger/shared/contracts/parts';
import type { RIG_STATES, SENSOR_KINDS } from '@stayledger/shared/contracts/sensors';
import type { RIG_TYPES, USE_KINDS } from '@stayledger/shared/contracts/vessels';
import type { Role } from '@stayledger/shared/permissions/permissions';
import type { Side } from '@stayledger/shared/rig/positions';

/**
 * The demo: a stretch of northern coast that is on no map, with working sail. Everybody and everything in it is
 * invented. Ages are counted back from the day of the first start, so that what is overdue stays overdue.
 */

/** Fixed ids, so that seeds, demo logs and tests speak of the same rows. The first part says what it is. */
function demoId(kind: string, number: number): string {
  return `0190d3a0-${kind}-7000-8000-${number.toString(16).padStart(12, '0')}`;
}

export const DEMO_FIRMS = {
  riggers: { id: demoId('0001', 1), name: 'Grindskjer Riggers', kind: 'rigging' },
  surveyors: { id: demoId('0001', 2), name: 'Varholm Survey Practice', kind: 'survey' },
  insurer: { id: demoId('0001', 3), name: 'Ytterskjer Mutual', kind: 'insurer' },
  service: { id: demoId('0001', 4), name: 'Stayledger demo service', kind: 'service' },
} as const;

export interface DemoPerson {
  id: string;
  name: string;
  email: string;
  role: Role;
  firm: keyof typeof DEMO_FIRMS | null;
}

export const DEMO_PEOPLE: readonly DemoPerson[] = [
  person(1, 'Ingrid Vollsund', 'surveyor', 'surveyors'),
  person(2, 'Tor Eikanger', 'rigger', 'riggers'),
  person(3, 'Maren Lystvik', 'owner', null),
  person(4, 'Henrik Aunholm', 'insurer', 'insurer'),
  person(5, 'Sigrid Moldal', 'administrator', 'service'),
];

/** Whoever looks after the demo's rigs day by day. */
export const DEMO_RIGGER = DEMO_PEOPLE[1];

export interface DemoPart {
  constructionId: string;
  diameterMm: number;
  /** kN by its certificate; left out: taken from the table. */
  certificateKn?: number;
  lengthM: number;
  terminal: (typeof TERMINALS)[number];
  threadSize?: string;
  pinDiameterMm?: number;
  /** Left out: not known. */
  fittedMonthsAgo?: number;
}

export interface DemoPosition {
  id: string;
  kind: string;
  side: Side;
  mast: string;
  part: DemoPart | null;
}

/** A sensor of the demo, placed on one of the vessel's positions by its number in the list. */
export interface DemoSensor {
  name: string;
  kind: (typeof SENSOR_KINDS)[number];
  position: number;
  fullScaleKn: number;
  /** Left out: nobody has its papers. */
  errorPercent?: number;
  placedMonthsAgo: number;
  /** Months ago and state of the rig; left out: never checked. */
  zeroCheck?: { monthsAgo: number; readingKn: number; rigState: (typeof RIG_STATES)[number] };
  calibratedMonthsAgo?: number;
}

export interface DemoVessel {
  id: string;
  name: string;
  rigType: (typeof RIG_TYPES)[number];
  zone: string;
  buildYear: number;
  lengthM: number;
  homePort: string;
  useKind: (typeof USE_KINDS)[number];
  notes: string;
  /** Left out: nobody has said how much she will sail. */
  plannedHoursPerYear?: number;
  ownerId: string | null;
  sharedWithInsurer: boolean;
  positions: readonly DemoPosition[];
  sensors?: readonly DemoSensor[];
}

const ZONE = 'Europe/Oslo';
const OWNER = DEMO_PEOPLE[2].id;

/** Charter cutter: the vessel whose story is told with recorded loads. */
const cutter: DemoVessel = {
  id: demoId('0003', 1),
  name: 'Ternesund',
  rigType: 'cutter',
  zone: ZONE,
  buildYear: 1999,
  lengthM: 14.2,
  homePort: 'Kvitholmen',
  useKind: 'charter',
  notes: 'Load pins in both cap shrouds and the backstay, a load link in the forestay.',
  plannedHoursPerYear: 900,
  ownerId: OWNER,
  sharedWithInsurer: true,
  positions: positionsOf(1, [
    ['forestay', 'centre', strand(10, 17.4, 26, 'mechanical', 'M16', 16)],
    ['inner-forestay', 'centre', strand(8, 12.1, 26, 'mechanical', 'M12', 12.7)],
    ['cap-shroud', 'port', strand(10, 17.0, 26, 'swaged', 'M16', 16)],
    ['cap-shroud', 'starboard', strand(10, 17.0, 26, 'swaged', 'M16', 16)],
    ['lower', 'port', strand(8, 8.2, 77, 'swaged', 'M12', 12.7)],
    ['lower', 'starboard', strand(8, 8.2, 77, 'swaged', 'M12', 12.7)],
    ['backstay', 'centre', strand(8, 18.3, 92, 'swaged', 'M12', 12.7)],
    ['halyard', 'centre', null],
  ]),
  sensors: [
    {
      name: 'Link F',
      kind: 'link',
      position: 0,
      fullScaleKn: 100,
      errorPercent: 0.5,
      placedMonthsAgo: 20,
      zeroCheck: { monthsAgo: 3, readingKn: 0.2, rigState: 'slack' },
      calibratedMonthsAgo: 20,
    },
    {
      name: 'Pin P',
      kind: 'pin',
      position: 2,
      fullScaleKn: 80,
      errorPercent: 1,
      placedMonthsAgo: 20,
      zeroCheck: { monthsAgo: 3, readingKn: 6.4, rigState: 'dock-tune' },
      calibratedMonthsAgo: 20,
    },
    {
      name: 'Pin S',
      kind: 'pin',
      position: 3,
      fullScaleKn: 80,
      errorPercent: 1,
      placedMonthsAgo: 20,
      zeroCheck: { monthsAgo: 9, readingKn: 0.4, rigState: 'unstepped' },
      calibratedMonthsAgo: 31,
    },
    { name: 'Pin B', kind: 'pin', position: 6, fullScaleKn: 80, placedMonthsAgo: 6 },
  ],
};

/** Sail-training schooner: galvanised wire, old papers. */
const schooner: DemoVessel = {
  id: demoId('0003', 2),
  name: 'Havdronning',
  rigType: 'schooner',
  zone: ZONE,
  buildYear: 1938,
  lengthM: 28.6,
  homePort: 'Ytre Grindvik',
  useKind: 'sail-training',
  notes: 'Galvanised wire served at the splices. Fitting days of the fore mast come from the yard book.',
  plannedHoursPerYear: 1100,
  ownerId: null,
  sharedWithInsurer: true,
  positions: positionsOf(2, [
    ['forestay', 'centre', rope(16, 21.5, 131), 'fore'],
    ['cap-shroud', 'port', rope(16, 20.8, 112), 'fore'],
    ['cap-shroud', 'starboard', rope(16, 20.8, 112), 'fore'],
    ['cap-shroud', 'port', rope(16, 22.4, 50)],
    ['cap-shroud', 'starboard', rope(16, 22.4, 50)],
    ['triatic', 'centre', rope(12, 7.9)],
    ['bobstay', 'centre', rope(16, 5.2, 112)],
  ]),
};

/** Sail-cargo ketch: strand, no sensors yet, no usage plan. */
const ketch: DemoVessel = {
  id: demoId('0003', 3),
  name: 'Tangrose',
  rigType: 'ketch',
  zone: ZONE,
  buildYear: 1974,
  lengthM: 19.8,
  homePort: 'Sundevarden',
  useKind: 'sail-cargo',
  notes: 'Bought with the rig as it stands; the mizzen has no papers.',
  ownerId: null,
  sharedWithInsurer: false,
  positions: positionsOf(3, [
    ['forestay', 'centre', strand(12, 19.2, 40, 'mechanical', 'M20', 19)],
    ['cap-shroud', 'port', strand(12, 18.6, 40, 'swaged', 'M20', 19)],
    ['cap-shroud', 'starboard', strand(12, 18.6, 40, 'swaged', 'M20', 19)],
    ['lower', 'port', strand(10, 9.0, 40, 'swaged', 'M16', 16)],
    ['lower', 'starboard', strand(10, 9.0, 40, 'swaged', 'M16', 16)],
    ['cap-shroud', 'port', strand(8, 11.2, undefined, 'unknown'), 'mizzen'],
    ['cap-shroud', 'starboard', strand(8, 11.2, undefined, 'unknown'), 'mizzen'],
  ]),
};

/** Rod-rigged sloop, privately sailed. */
const sloop: DemoVessel = {
  id: demoId('0003', 4),
  name: 'Snarfare',
  rigType: 'fractional-sloop',
  zone: ZONE,
  buildYear: 2011,
  lengthM: 12.4,
  homePort: 'Kvitholmen',
  useKind: 'private',
  notes: '',
  plannedHoursPerYear: 220,
  ownerId: null,
  sharedWithInsurer: false,
  positions: positionsOf(4, [
    ['forestay', 'centre', rod(8.38, 16.2, 34)],
    ['cap-shroud', 'port', rod(7.94, 11.0, 34)],
    ['cap-shroud', 'starboard', rod(7.94, 11.0, 34)],
    ['lower', 'port', rod(7.14, 6.4, 34)],
    ['lower', 'starboard', rod(7.14, 6.4, 34)],
    ['backstay', 'centre', rod(6.35, 17.5, 34)],
  ]),
};

/** Fibre-rigged trimaran: kept by the calendar alone. */
const trimaran: DemoVessel = {
  id: demoId('0003', 5),
  name: 'Lomvi',
  rigType: 'fractional-sloop',
  zone: ZONE,
  buildYear: 2018,
  lengthM: 11.1,
  homePort: 'Indre Varden',
  useKind: 'private',
  notes: 'Fibre rigging throughout; lashings are looked at every spring.',
  plannedHoursPerYear: 180,
  ownerId: null,
  sharedWithInsurer: false,
  positions: positionsOf(5, [
    ['forestay', 'centre', fibre(11, 14.8, 20)],
    ['cap-shroud', 'port', fibre(11, 13.9, 51)],
    ['cap-shroud', 'starboard', fibre(11, 13.9, 51)],
    ['running-backstay', 'port', fibre(9, 15.2, 20)],
    ['running-backstay', 'starboard', fibre(9, 15.2, 20)],
  ]),
};

export const DEMO_VESSELS: readonly DemoVessel[] = [cutter, schooner, ketch, sloop, trimaran];

/** The vessel the demo's load logs belong to. */
export const DEMO_LOGGED_VESSEL = cutter;

function person(n: number, name: string, role: Role, firm: DemoPerson['firm']): DemoPerson {
  return { id: demoId('0002', n), name, email: `${role}@demo.stayledger.example`, role, firm };
}

type PositionRow = [kind: string, side: Side, part: DemoPart | null, mast?: string];

function positionsOf(vessel: number, rows: readonly PositionRow[]): DemoPosition[] {
  return rows.map(([kind, side, part, mast = 'main'], index) => ({
    id: demoId('0004', vessel * 256 + index + 1),
    kind,
    side,
    mast,
    part,
  }));
}

function strand(
  diameterMm: number,
  lengthM: number,
  fittedMonthsAgo: number | undefined,
  terminal: DemoPart['terminal'],
  threadSize?: string,
  pinDiameterMm?: number,
): DemoPart {
  return {
    constructionId: 'strand-1x19-316',
    diameterMm,
    lengthM,
    terminal,
    threadSize,
    pinDiameterMm,
    fittedMonthsAgo,
  };
}

function rope(diameterMm: number, lengthM: number, fittedMonthsAgo?: number): DemoPart {
  return {
    constructionId: 'rope-6x7-fibre-core-galvanised-1770',
    diameterMm,
    lengthM,
    terminal: 'spliced-eye',
    fittedMonthsAgo,
  };
}

function rod(diameterMm: number, lengthM: number, fittedMonthsAgo: number): DemoPart {
  return { constructionId: 'rod-s20910', diameterMm, lengthM, terminal: 'cold-head', fittedMonthsAgo };
}

function fibre(diameterMm: number, lengthM: number, fittedMonthsAgo: number): DemoPart {
  return { constructionId: 'fibre-hmpe', diameterMm, lengthM, terminal: 'spliced-eye', fittedMonthsAgo };
}
