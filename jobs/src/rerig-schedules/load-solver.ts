import { highsSolver } from '@stayledger/shared/rerig-schedule/highs-solver';
import type { ProgramSolver } from '@stayledger/shared/rerig-schedule/mixed-integer-program';
import loadHighs from 'highs';

let loading: Promise<ProgramSolver> | null = null;

/** The HiGHS solver, loaded once per thread. It holds the thread while it solves. */
export function loadSolver(): Promise<ProgramSolver> {
  loading ??= loadHighs().then((highs) => highsSolver(highs));
  return loading;
}
