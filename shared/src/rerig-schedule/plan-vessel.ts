import { lateTasksOf } from './late-tasks.js';
import type { ProgramSolver, SolveLimits } from './mixed-integer-program.js';
import { NO_DECISIONS } from './plan-input.js';
import type { PlanInput } from './plan-input.js';
import { planProblems } from './plan-problems.js';
import { costOfChoice, readPlan } from './read-plan.js';
import { solveVessel } from './solve-vessel.js';
import type { VesselSolution } from './solve-vessel.js';
import { vesselModel } from './vessel-model.js';
import type { VesselModel } from './vessel-model.js';
import { MINOR_PER_PROGRAM_UNIT } from './vessel-program.js';
import type { Measure, ProgramSettings } from './vessel-program.js';
import type { VesselPlan } from './vessel-plan.js';

/**
 * What a plan is chosen by, once nothing is later than it must be. 'least-cost'; 'fewest-visits', then least cost;
 * 'latest-allowed': as little life given away as can be, then least cost.
 */
export type PlanPreference = 'least-cost' | 'fewest-visits' | 'latest-allowed';

/** Stops of the solver for one plan: a gap of 0.1 % within 10 s. */
export const DEFAULT_LIMITS: SolveLimits = { timeLimitS: 10, relativeGap: 0.001 };

/** Remark on a plan made without decisions that no plan can follow. */
export const CONTRADICTION =
  'What has been settled by hand contradicts itself, so this plan was made without it.';

const FIRST_MEASURE: Record<PlanPreference, Measure> = {
  'least-cost': 'cost',
  'fewest-visits': 'visits',
  'latest-allowed': 'unused-days',
};

/**
 * Plans one vessel: which visits, of which kind, and what is done in each, so that nothing runs past its date and the
 * whole costs least.
 *
 * Where that cannot be, the plan is the one with the fewest days late, and says which tasks are late and why. Where
 * decisions contradict each other, the plan is made without them and a remark says so.
 *
 * @param input see {@link PlanInput}
 * @param solver proves the plan; HiGHS in the product
 * @param settings.room hours and berths left in windows, for a vessel planned among others
 * @throws RangeError where {@link planProblems} has something to say
 * @throws Error where the solver finds nothing within its time
 */
export function planVessel(
  input: PlanInput,
  solver: ProgramSolver,
  limits: SolveLimits = DEFAULT_LIMITS,
  settings: { preference?: PlanPreference; room?: ProgramSettings['room'] } = {},
): VesselPlan {
  const problems = planProblems(input);
  if (problems.length > 0) throw new RangeError(problems.join(' '));
  const first = FIRST_MEASURE[settings.preference ?? 'least-cost'];
  const model = vesselModel(input);
  const inTime = solvedBy(model, first, { room: settings.room }, solver, limits);
  if (inTime !== null) return planOf(model, inTime, []);

  const leastLate = leastLatePlan(model, first, settings.room, solver, limits);
  if (leastLate !== null) return planOf(model, leastLate, []);

  const free = vesselModel({ ...input, decisions: NO_DECISIONS });
  const solution =
    solvedBy(free, first, {}, solver, limits) ?? leastLatePlan(free, first, undefined, solver, limits);
  if (solution === null) throw new Error('No plan exists, not even a late one.');
  return planOf(free, solution, [CONTRADICTION]);
}

/** Least lateness first, then the measure asked for within that lateness. */
function leastLatePlan(
  model: VesselModel,
  first: Measure,
  room: ProgramSettings['room'],
  solver: ProgramSolver,
  limits: SolveLimits,
): VesselSolution | null {
  const settings: ProgramSettings = { formulation: 'arcs', minimise: 'late-days', lateAllowed: true, room };
  const latest = solveVessel(model, settings, solver, { ...limits, relativeGap: 0 });
  if (latest === null) return null;
  // Half a day of slack swallows the solver's tolerance; lateness is in whole days.
  const atMost = { 'late-days': Math.round(latest.objective) + 0.5 };
  return solvedBy(model, first, { room, lateAllowed: true, atMost }, solver, limits);
}

/** Minimises a measure, then cost among the plans that are best by it. */
function solvedBy(
  model: VesselModel,
  first: Measure,
  settings: Pick<ProgramSettings, 'room' | 'lateAllowed' | 'atMost'>,
  solver: ProgramSolver,
  limits: SolveLimits,
): VesselSolution | null {
  const formulation = settings.lateAllowed === true ? 'arcs' : 'covering';
  if (first === 'cost') {
    return solveVessel(model, { ...settings, formulation, minimise: 'cost' }, solver, limits);
  }
  const best = solveVessel(model, { ...settings, formulation, minimise: first }, solver, {
    ...limits,
    relativeGap: 0,
  });
  if (best === null) return null;
  const atMost = { ...settings.atMost, [first]: Math.round(best.objective) + 0.5 };
  return solveVessel(model, { ...settings, formulation, minimise: 'cost', atMost }, solver, limits);
}

function planOf(model: VesselModel, solution: VesselSolution, remarks: string[]): VesselPlan {
  const totalMinor = costOfChoice(model, solution.choice);
  // Plans cost whole minor units, so a proven bound may be rounded up to the next one (less a solver's tolerance).
  const provenMinor = Math.ceil(solution.bound * MINOR_PER_PROGRAM_UNIT - 1e-3 * MINOR_PER_PROGRAM_UNIT);
  const boundMinor = Math.max(0, Math.min(totalMinor, provenMinor));
  return {
    ...readPlan(model, solution.choice, lateTasksOf(model, solution.choice), [
      ...remarks,
      ...solution.built.impossible,
    ]),
    proof: {
      ended: solution.ended,
      boundMinor,
      gap: totalMinor === 0 ? 0 : (totalMinor - boundMinor) / totalMinor,
    },
  };
}
