import type {
  MixedIntegerProgram,
  OpenProgram,
  ProgramSolution,
  ProgramSolver,
  SolveLimits,
} from './mixed-integer-program.js';

/** The calls of a loaded HiGHS runtime (npm `highs`) that are made here; the package itself stays with the caller. */
export interface HighsRuntime {
  readonly constants: {
    readonly variableType: { readonly continuous: number; readonly integer: number };
    readonly modelStatus: Record<'optimal' | 'infeasible' | 'unboundedOrInfeasible' | 'timeLimit', number>;
  };
  createModel(): HighsModel;
}

/** One model inside the runtime; its memory is freed only by `dispose`. */
export interface HighsModel {
  readonly options: { set(options: Record<string, boolean | number | string>): unknown };
  readonly info: { get(name: string): number | bigint };
  passModel(model: {
    numCols: number;
    numRows: number;
    colCost: Float64Array;
    colLower: Float64Array;
    colUpper: Float64Array;
    rowLower: Float64Array;
    rowUpper: Float64Array;
    matrix: {
      format: 'csr';
      numCols: number;
      numRows: number;
      starts: Int32Array;
      indices: Int32Array;
      values: Float64Array;
    };
    integrality?: Int32Array;
  }): unknown;
  changeColsCost(selection: { kind: 'range'; from: number; to: number }, costs: Float64Array): unknown;
  setSolution(solution: { colValue: Float64Array }): unknown;
  run(): unknown;
  getModelStatus(): number;
  getSolution(): { readonly colValue: Float64Array; readonly rowDual: Float64Array };
  dispose(): void;
}

/**
 * The HiGHS solver (MIT licence, WebAssembly build, one thread) behind {@link ProgramSolver}.
 *
 * @param highs the loaded runtime; loading is the caller's, for it differs between Node and a browser
 */
export function highsSolver(highs: HighsRuntime): ProgramSolver {
  return {
    solve: (program, limits) => {
      const model = highs.createModel();
      try {
        return solved(highs, model, program, limits);
      } finally {
        model.dispose();
      }
    },
    openRelaxed: (program) => openRelaxed(highs, program),
  };
}

function openRelaxed(highs: HighsRuntime, program: MixedIntegerProgram): OpenProgram {
  const model = highs.createModel();
  // Presolve would throw away the basis that makes the next solve short.
  model.options.set({ output_flag: false, presolve: 'off' });
  passProgram(highs, model, program, false);
  return {
    solve: (costs) => {
      model.changeColsCost({ kind: 'range', from: 0, to: costs.length - 1 }, costs);
      model.run();
      if (model.getModelStatus() !== highs.constants.modelStatus.optimal) return null;
      return {
        objective: Number(model.info.get('objective_function_value')),
        values: model.getSolution().colValue,
      };
    },
    close: () => model.dispose(),
  };
}

function passProgram(
  highs: HighsRuntime,
  model: HighsModel,
  program: MixedIntegerProgram,
  hasWhole: boolean,
): void {
  const { variableType } = highs.constants;
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
          integrality: Int32Array.from(program.whole, (whole) =>
            whole ? variableType.integer : variableType.continuous,
          ),
        }
      : {}),
  });
}

function solved(
  highs: HighsRuntime,
  model: HighsModel,
  program: MixedIntegerProgram,
  limits: SolveLimits,
): ProgramSolution {
  const { modelStatus } = highs.constants;
  const hasWhole = program.whole.includes(1);
  model.options.set({
    output_flag: false,
    time_limit: limits.timeLimitS,
    mip_rel_gap: limits.relativeGap,
    mip_abs_gap: 1e-6,
  });
  passProgram(highs, model, program, hasWhole);
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
