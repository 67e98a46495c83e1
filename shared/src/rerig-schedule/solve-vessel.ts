import { dropIdleWork } from './drop-idle-work.js';
import type { MixedIntegerProgram, ProgramSolver, SolveLimits } from './mixed-integer-program.js';
import type { VesselChoice } from './read-plan.js';
import type { VesselModel } from './vessel-model.js';
import { vesselProgram } from './vessel-program.js';
import type { ProgramSettings, VesselProgram } from './vessel-program.js';

/** A solved program of one vessel. */
export interface VesselSolution {
  choice: VesselChoice;
  /** In the unit of the measure minimised; for cost in hundreds of minor units, prices included. */
  objective: number;
  bound: number;
  ended: 'proven' | 'time-limit';
  built: VesselProgram;
}

const WHOLE_TOLERANCE = 1e-6;

/**
 * Builds and solves the program of one vessel.
 *
 * @returns null where no choice satisfies the program
 * @throws Error where the solver fails or finds nothing within its time
 */
export function solveVessel(
  model: VesselModel,
  settings: ProgramSettings,
  solver: ProgramSolver,
  limits: SolveLimits,
): VesselSolution | null {
  const built = vesselProgram(model, settings);
  if (built.program.costs.length === 0) return unlessRowsFail(built);
  const solved = solver.solve(built.program, limits);
  if (solved.status === 'infeasible') return null;
  if (solved.values === null) {
    throw new Error(`The solver found no plan within ${limits.timeLimitS} s.`);
  }
  const values = isWhole(built, solved.values)
    ? solved.values
    : settled(built, solved.values, solver, limits);
  return {
    choice: dropIdleWork(model, choiceOf(built, values)),
    objective: solved.objective,
    bound: solved.bound,
    ended: solved.status === 'solved' ? 'proven' : 'time-limit',
    built,
  };
}

/** A program without columns holds only where each of its rows admits zero. */
function unlessRowsFail(built: VesselProgram): VesselSolution | null {
  const { rowLowers, rowUppers } = built.program;
  if (rowLowers.some((lower, row) => lower > 0 || rowUppers[row] < 0)) return null;
  return { choice: { visits: [], works: [] }, objective: 0, bound: 0, ended: 'proven', built };
}

function isWhole(built: VesselProgram, values: Float64Array): boolean {
  return built.works.every(
    ({ column }) => Math.abs(values[column] - Math.round(values[column])) < WHOLE_TOLERANCE,
  );
}

/** Splits between equally cheap windows are settled by solving once more with the visits fixed and whole work. */
function settled(
  built: VesselProgram,
  values: Float64Array,
  solver: ProgramSolver,
  limits: SolveLimits,
): Float64Array {
  const { lowers, uppers, whole } = built.program;
  const program: MixedIntegerProgram = {
    ...built.program,
    lowers: lowers.slice(),
    uppers: uppers.slice(),
    whole: whole.slice(),
  };
  for (const { column } of built.visits) {
    program.lowers[column] = Math.round(values[column]);
    program.uppers[column] = Math.round(values[column]);
  }
  for (const { column } of built.works) program.whole[column] = 1;
  const solved = solver.solve(program, { timeLimitS: limits.timeLimitS, relativeGap: 0 });
  if (solved.values === null) throw new Error('The visits found allow no whole plan.');
  return solved.values;
}

function choiceOf(built: VesselProgram, values: Float64Array): VesselChoice {
  return {
    visits: built.visits
      .filter(({ column }) => values[column] > 0.5)
      .map(({ window, kind }) => ({ window, kind })),
    works: built.works
      .filter(({ column }) => values[column] > 0.5)
      .map(({ taskIndex, window, kind }) => ({ taskIndex, window, kind })),
  };
}
