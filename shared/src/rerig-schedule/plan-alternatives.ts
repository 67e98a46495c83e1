import type { ProgramSolver, SolveLimits } from './mixed-integer-program.js';
import type { PlanInput } from './plan-input.js';
import { DEFAULT_LIMITS, planVessel } from './plan-vessel.js';
import type { PlanPreference } from './plan-vessel.js';
import type { VesselPlan } from './vessel-plan.js';

/** The same vessel planned at least cost, with fewest visits, and each part as late as it may be; side by side. */
export function planAlternatives(
  input: PlanInput,
  solver: ProgramSolver,
  limits: SolveLimits = DEFAULT_LIMITS,
): Record<PlanPreference, VesselPlan> {
  return {
    'least-cost': planVessel(input, solver, limits, { preference: 'least-cost' }),
    'fewest-visits': planVessel(input, solver, limits, { preference: 'fewest-visits' }),
    'latest-allowed': planVessel(input, solver, limits, { preference: 'latest-allowed' }),
  };
}
