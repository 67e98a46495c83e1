import { DEFAULT_CONTINGENCY_SHARE, DEFAULT_ORDER_MARGIN_DAYS } from './plan-input.js';
import type { VisitKind, WorkTerms } from './plan-input.js';
import type { DaySpan } from './plan-windows.js';

/** What replacing a part of one kind of wire takes; cost grows with the part's size. */
export interface ReplacementTerms {
  /** Terminals, pins, measuring and fitting of one part, minor units. */
  perPartMinor: number;
  /** The wire itself: for each metre of length and millimetre of diameter, minor units. */
  perMetreMillimetreMinor: number;
  /** Rigger hours for one part with the mast out; with the mast up it takes half as long again. */
  hours: number;
  /** Days from ordering the material to having it. */
  leadDays: number;
  /** Whether such a part may be changed with the mast up. */
  aloft: boolean;
}

/** A season of every year in which the yard takes vessels. */
export interface YearlySeason {
  id: string;
  /** "Spring". */
  name: string;
  /** First and last day, 'MM-DD'; a season that ends before it begins ends in the year after. */
  fromDay: string;
  untilDay: string;
  /** Vessels the yard has room for in one such season. */
  berths: number;
  /** Rigger hours the yard has in one such season. */
  hours: number;
}

/** What a firm asks for its work, and when its yard is open. Money in minor units of the firm's currency. */
export interface YardTerms {
  /** A visit itself: travel and climbing, or two lifts, and storage. */
  visits: Record<VisitKind, WorkTerms>;
  contingencyShare: number;
  orderMarginDays: number;
  replacements: Record<'strand' | 'rod' | 'fibre', ReplacementTerms>;
  /** Looking over the whole rig. */
  inspection: WorkTerms;
  /** Months between inspections; 0: none are planned. */
  inspectionEveryMonths: number;
  seasons: readonly YearlySeason[];
  closures: readonly (DaySpan & { reason: string })[];
}

/**
 * Terms to start from, until a firm states its own. Every figure is invented, an estimate for a vessel of some 12 m, and
 * not anybody's price. That rod is changed with the mast out and strand may be changed one at a time with the mast up is
 * common practice, no source.
 */
export const STARTING_YARD_TERMS: YardTerms = {
  visits: {
    aloft: { costMinor: 18_000, hours: 2 },
    'mast-out-afloat': { costMinor: 95_000, hours: 10 },
    'mast-out-ashore': { costMinor: 140_000, hours: 12 },
  },
  contingencyShare: DEFAULT_CONTINGENCY_SHARE,
  orderMarginDays: DEFAULT_ORDER_MARGIN_DAYS,
  replacements: {
    strand: { perPartMinor: 24_000, perMetreMillimetreMinor: 160, hours: 4, leadDays: 42, aloft: true },
    rod: { perPartMinor: 52_000, perMetreMillimetreMinor: 420, hours: 5, leadDays: 70, aloft: false },
    fibre: { perPartMinor: 18_000, perMetreMillimetreMinor: 260, hours: 4, leadDays: 42, aloft: true },
  },
  inspection: { costMinor: 26_000, hours: 5 },
  inspectionEveryMonths: 24,
  seasons: [
    { id: 'spring', name: 'Spring', fromDay: '03-01', untilDay: '05-15', berths: 6, hours: 400 },
    { id: 'autumn', name: 'Autumn', fromDay: '10-01', untilDay: '12-10', berths: 6, hours: 400 },
  ],
  closures: [],
};
