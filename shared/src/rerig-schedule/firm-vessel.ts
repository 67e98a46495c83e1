import type { ProgramSolver, SolveLimits } from './mixed-integer-program.js';
import { NO_DECISIONS } from './plan-input.js';
import type { PlanInput } from './plan-input.js';
import { solveVessel } from './solve-vessel.js';
import { vesselModel } from './vessel-model.js';
import { vesselOption } from './vessel-option.js';
import type { VesselOption } from './vessel-option.js';
import { MINOR_PER_PROGRAM_UNIT } from './vessel-program.js';
import type { ProgramSettings, WindowPrices, WindowRoom } from './vessel-program.js';

/** A question about one vessel of a firm. Plain data, so that it can be asked in another thread. */
export interface FirmVesselRequest {
  input: PlanInput;
  /** Prices of the yard's room; the cheapest option at them is asked for. */
  prices?: WindowPrices;
  /** Room the other vessels leave; the cheapest option within it is asked for. */
  room?: WindowRoom;
  /** True where a task may run later than it must, at a cost per day. */
  lateAllowed: boolean;
  lateDayCostMinor: number;
  limits: SolveLimits;
}

/** An option with what is proven about it. */
export interface FirmVesselAnswer {
  option: VesselOption;
  /** No option costs less at these prices, days late included; minor units. */
  boundMinor: number;
  /** True where what was settled by hand contradicts itself and was left out. */
  withoutDecisions: boolean;
  /** True where no plan of the vessel keeps each task as early as it could be alone: one has to give way. */
  hasToGiveWay: boolean;
  /** What was settled by hand and cannot be done at all, in words. */
  impossible: string[];
}

/** Whoever answers: this thread, or a pool of others. Null: no option fits the room. */
export type FirmVesselSolver = (request: FirmVesselRequest) => Promise<FirmVesselAnswer | null>;

/**
 * The cheapest option of one vessel at prices for the yard's room, or within the room left.
 *
 * @returns null where nothing fits the room without running later than it must
 * @throws Error where the solver finds nothing within its time
 */
export function firmVessel(request: FirmVesselRequest, solver: ProgramSolver): FirmVesselAnswer | null {
  const { input, prices, room, lateDayCostMinor, limits } = request;
  const attempt = (lateAllowed: boolean, withoutDecisions: boolean): FirmVesselAnswer | null => {
    const model = vesselModel(withoutDecisions ? { ...input, decisions: NO_DECISIONS } : input);
    const settings: ProgramSettings = {
      formulation: lateAllowed ? 'arcs' : 'covering',
      minimise: 'cost',
      lateAllowed,
      // Days that no plan avoids weigh the same in every option: only paths that all carry them are left.
      lateDayCostMinor,
      prices,
      room,
    };
    const solved = solveVessel(model, settings, solver, limits);
    if (solved === null) return null;
    const option = vesselOption(model, solved.choice);
    return {
      option,
      boundMinor: solved.bound * MINOR_PER_PROGRAM_UNIT,
      withoutDecisions,
      hasToGiveWay: lateAllowed && !request.lateAllowed,
      impossible: solved.built.impossible,
    };
  };
  const first = attempt(request.lateAllowed, false);
  if (first !== null || room !== undefined) return first;
  return attempt(true, false) ?? attempt(false, true) ?? attempt(true, true);
}
