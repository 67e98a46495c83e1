import type { PlanInput, VisitKind } from './plan-input.js';

/** Room a yard has in one window. What is left out has no limit. */
export interface YardWindow {
  id: string;
  riggerHours?: number;
  /** Vessels that can lie there for each kind of visit. */
  berths?: Partial<Record<VisitKind, number>>;
}

/** All vessels of a firm against the room of its yard. Windows of vessels and yard are the same where ids are. */
export interface FirmInput {
  windows: readonly YardWindow[];
  vessels: readonly { vesselId: string; name: string; input: PlanInput }[];
  /** What a task's day past its date weighs against money, minor units; {@link DEFAULT_LATE_DAY_COST_MINOR}. */
  lateDayCostMinor: number;
}

/**
 * Weight of a day late: so high that a lift is paid before a part runs ten days over. An engineering choice without a
 * source; it decides only where a yard has too little room for every vessel to be in time.
 */
export const DEFAULT_LATE_DAY_COST_MINOR = 50_000;
