/** Minimise cost over columns between bounds, subject to rows of sparse coefficients between bounds. */
export interface MixedIntegerProgram {
  costs: Float64Array;
  lowers: Float64Array;
  uppers: Float64Array;
  /** 1 where a column must be whole. */
  whole: Uint8Array;
  rowLowers: Float64Array;
  rowUppers: Float64Array;
  /** Compressed rows: entries of row r are rowStarts[r] to rowStarts[r + 1], exclusive. */
  rowStarts: Int32Array;
  columnIndices: Int32Array;
  coefficients: Float64Array;
}

/** When a solver may stop. */
export interface SolveLimits {
  timeLimitS: number;
  /** Relative gap between the best solution and the proven bound at which to stop; 0 proves the optimum. */
  relativeGap: number;
  /** A solution to start from, one value per column. */
  start?: Float64Array;
}

/** What a solver says. `bound` is proven: no solution costs less. */
export interface ProgramSolution {
  status: 'solved' | 'stopped' | 'infeasible' | 'failed';
  /** Null where no solution was found. */
  values: Float64Array | null;
  objective: number;
  bound: number;
  /** Price of each row; only for programs without whole columns. */
  rowDuals: Float64Array | null;
}

/** A program without whole columns that is solved again and again at other costs, each time from where it stood. */
export interface OpenProgram {
  /** Null where no solution satisfies the rows. */
  solve(costs: Float64Array): { objective: number; values: Float64Array } | null;
  /** Frees what the solver holds. */
  close(): void;
}

/** The solver the planner is given. Pure code holds no solver of its own, so that it runs wherever one can be loaded. */
export interface ProgramSolver {
  solve(program: MixedIntegerProgram, limits: SolveLimits): ProgramSolution;
  /** Opens the relaxation of a program: its columns need not be whole. */
  openRelaxed(program: MixedIntegerProgram): OpenProgram;
}
