import type { VisitKind } from './plan-input.js';
import type { VesselPlan } from './vessel-plan.js';

/** How good the plan of a firm is known to be. Money in minor units; days late count at their cost. */
export interface FirmProof {
  ended: 'within-gap' | 'time-limit';
  /** Cost of the plan and of the days late that a better plan might avoid. */
  weightMinor: number;
  /** No plan weighs less. */
  boundMinor: number;
  /** (weight - bound) / weight. */
  gap: number;
  /**
   * False: the bound holds for plans in which nobody is later than the vessel's own windows force. True: the yard has too
   * little room for that, and the bound holds for every plan, late days counted.
   */
  lateCounted: boolean;
  /** Rounds of prices. */
  rounds: number;
}

/** A window of the yard in the plan of a firm. */
export interface FirmPlanWindow {
  windowId: string;
  visits: { vesselId: string; kind: VisitKind; hours: number }[];
  hours: number;
  /** Null: no limit. */
  hoursRoom: number | null;
  /** What one more rigger hour in this window would save, about; minor units. */
  hourPriceMinor: number;
  berths: { kind: VisitKind; used: number; room: number | null; priceMinor: number }[];
  /** True only where visits that stand ask for more than there is. */
  isOverfull: boolean;
}

/** The plan of all vessels of a firm. The proof of the whole stands here, not in the plans of the vessels. */
export interface FirmPlan {
  vessels: { vesselId: string; name: string; plan: Omit<VesselPlan, 'proof'> }[];
  totalMinor: number;
  lateDays: number;
  proof: FirmProof;
  windows: FirmPlanWindow[];
}
