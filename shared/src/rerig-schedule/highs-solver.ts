import type { Highs, Model } from 'highs';
import type {
  MixedIntegerProgram,
  ProgramSolution,
  ProgramSolver,
  SolveLimits,
} from './mixed-integer-program.js';

/**
 * The HiGHS solver (MIT licence, WebAssembly build, one thread) behind {@link ProgramSolver}.
 *
 * @param highs the loaded runtime; loading is the caller's, for it differs between Node and a browser
 */
export function highsSolver(highs: Highs): ProgramSolver {
  return { solve: (program, limits) => highs.withModel((model) => solved(highs, model, program, limits)) };
}

function solved(
  highs: Highs,
  model: Model,
  program: MixedIntegerProgram,
  limits: SolveLimits,
): ProgramSolution {
  const { variableType, modelStatus } = highs.constants;
  const hasWhole = program.whole.includes(1);
  model.options.set({
    output_flag: false,
    time_limit: limits.timeLimitS,
    mip_rel_gap: limits.relativeGap,
    mip_abs_gap: 1e-6,
  });
  const numCols = program.costs.length;
  const numRows = program.rowLowers.length;
  model.passModel({
    numCols,
    numRows,
    colCost: program.costs,
    colLower: program.lowers,
    colUpper: program.uppers,
    rowLower: program.rowLowers,
    rowUpper: program.rowUppers,
    matrix: {
      format: 'csr',
      numCols,
      numRows,
      starts: program.rowStarts,
      indices: program.columnIndices,
      values: program.coefficients,
    },
    ...(hasWhole
      ? {
          integrality: Array.from(program.whole, (whole) =>
            whole ? variableType.integer : variableType.continuous,
          ),
        }
      : {}),
  });
  if (limits.start !== undefined) model.setSolution({ colValue: limits.start });
  model.run();
  const status = model.getModelStatus();
  if (status === modelStatus.infeasible || status === modelStatus.unboundedOrInfeasible) {
    return { status: 'infeasible', values: null, objective: Infinity, bound: Infinity, rowDuals: null };
  }
  const found = model.info.get('primal_solution_status') === 2;
  const objective = found ? Number(model.info.get('objective_function_value')) : Infinity;
  const optimal = status === modelStatus.optimal;
  const dualBound = hasWhole ? Number(model.info.get('mip_dual_bound')) : optimal ? objective : -Infinity;
  const solution = found ? model.getSolution() : null;
  return {
    status: optimal && found ? 'solved' : status === modelStatus.timeLimit ? 'stopped' : 'failed',
    values: solution?.colValue ?? null,
    objective,
    bound: Math.min(dualBound, objective),
    rowDuals: hasWhole ? null : (solution?.rowDual ?? null),
  };
}
