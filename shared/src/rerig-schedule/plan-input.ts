/** How a yard comes at the rig. Mast out afloat and ashore both cost two lifts; ashore also costs a hard-standing. */
export type VisitKind = 'aloft' | 'mast-out-afloat' | 'mast-out-ashore';

/** Every kind of visit, lightest first. */
export const VISIT_KINDS: readonly VisitKind[] = ['aloft', 'mast-out-afloat', 'mast-out-ashore'];

/** What a visit or a piece of work takes. Money is in integer minor units of the plan's currency. */
export interface WorkTerms {
  costMinor: number;
  /** Rigger hours. */
  hours: number;
}

/** A stretch of days in which the yard has room and the vessel is free. At most one visit falls in it. */
export interface PlanWindow {
  id: string;
  /** First and last day, 'YYYY-MM-DD'. */
  opensOn: string;
  closesOn: string;
  kinds: readonly VisitKind[];
  /** Cost of a visit in this window where it differs from the price list (season prices), minor units. */
  visitCostMinor?: Partial<Record<VisitKind, number>>;
}

/** Why a task is on the plan at all. */
export type TaskGround = 'replace-by' | 'inspection-interval' | 'provisional-date' | 'suspended-date';

/** Work that is planned as one: a part, or parts so alike that they are always taken together. */
export interface PlanTask {
  id: string;
  /** In the trade's words: "cap shrouds". */
  name: string;
  partIds: readonly string[];
  action: 'replace' | 'inspect';
  ground: TaskGround;
  /** Day by which it must be done, 'YYYY-MM-DD'; null where nothing asks for it by itself. */
  dueOn: string | null;
  /** Days from doing it until it is due again; null: not again within any horizon. */
  againAfterDays: number | null;
  /** Cost and hours in each kind of visit that allows the work; a kind left out does not allow it. */
  terms: Partial<Record<VisitKind, WorkTerms>>;
  /** Days from ordering the material to having it. */
  leadDays: number;
  /** Tasks that, when done, count as this one too (a new part counts as an inspected one). */
  alsoDoneBy: readonly string[];
  /** Tasks that must be done in the same visit whenever this one is (new wire takes new terminals). */
  needs: readonly string[];
}

/** What a person has settled by hand. Every list may be empty. */
export interface PlanDecisions {
  /** Visits that stand, booked or wished. */
  locked: readonly { windowId: string; kind: VisitKind }[];
  /** Windows (or kinds of visit in them) that must not be used. */
  barred: readonly { windowId: string; kind?: VisitKind }[];
  /** Tasks that must be done in a window. */
  pinned: readonly { taskId: string; windowId: string }[];
  /** Tasks that must not be done in a window. */
  kept: readonly { taskId: string; windowId: string }[];
}

/** Nothing settled by hand. */
export const NO_DECISIONS: PlanDecisions = { locked: [], barred: [], pinned: [], kept: [] };

/** Everything the plan of one vessel follows from. */
export interface PlanInput {
  /** Day the question is asked for, 'YYYY-MM-DD'. */
  asOfOn: string;
  /** Last day planned for; what falls due later is left out. */
  horizonEndOn: string;
  /** ISO 4217 code; one currency per plan. */
  currency: string;
  /** Cost and hours of a visit itself: lifts, storage, travel. A kind left out is never offered. */
  visitTerms: Partial<Record<VisitKind, WorkTerms>>;
  /** Share added to the bill of a mast-out visit for what the trestles show; {@link DEFAULT_CONTINGENCY_SHARE}. */
  contingencyShare: number;
  /** Days taken off a lead time as a margin when saying by when to order. */
  orderMarginDays: number;
  windows: readonly PlanWindow[];
  tasks: readonly PlanTask[];
  decisions: PlanDecisions;
}

/** Share of a mast-out bill set aside for what the trestles show. An engineering choice without a source. */
export const DEFAULT_CONTINGENCY_SHARE = 0.2;

/** Years planned ahead unless somebody says otherwise. An engineering choice without a source. */
export const DEFAULT_HORIZON_YEARS = 12;

/** Days added to a lead time before the order-by date. An engineering choice without a source. */
export const DEFAULT_ORDER_MARGIN_DAYS = 14;
