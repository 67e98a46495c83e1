import type { FirmInput } from './firm-input.js';
import { firmMaster, lastResortMinor } from './firm-master.js';
import type { MasterColumn, RoomLimit } from './firm-master.js';
import type { OpenProgram, ProgramSolver } from './mixed-integer-program.js';
import type { PlanInput } from './plan-input.js';
import { vesselModel } from './vessel-model.js';
import type { VesselModel } from './vessel-model.js';
import { MINOR_PER_PROGRAM_UNIT, vesselProgram } from './vessel-program.js';

/** Prices of the yard's room found on the relaxed programs of its vessels. */
export interface RelaxedPrices {
  /** Minor units per unit of each limit. */
  pricesMinor: number[];
  /** No plan weighs less, minor units. */
  boundMinor: number;
  /** True where even a relaxed plan passes a limit: the yard has too little room for every vessel to be in time. */
  isShort: boolean;
  rounds: number;
}

/** Stop of {@link relaxedPrices}. */
export interface RelaxedLimits {
  elapsedS: () => number;
  untilS: number;
  /** Gap between the mix and the bound at which the prices are good enough. */
  gap: number;
  onRound?: (boundMinor: number) => void;
}

interface RelaxedVessel {
  open: OpenProgram;
  baseCosts: Float64Array;
  costs: Float64Array;
  /** For each limit the columns that use it, with how much. */
  uses: { limit: number; column: number; use: number }[];
}

const STEPS = [0.7, 0.4, 0.2];

/**
 * Prices of berths and hours at which the vessels, each planning for itself and allowed to split a plan, ask for no more
 * than there is. Column generation (Dantzig and Wolfe, 1960) over relaxed programs, each kept open and solved anew from
 * where it stood, a few milliseconds a time; prices are drawn toward those of the best bound to keep them from swinging
 * (smoothing after Wentges, 1997). Relaxed programs of this kind are tight (the bound loses about 1 %), so the prices
 * serve the whole ones.
 *
 * @param vessels in the firm's order, each with whether its tasks may run late at the firm's cost per day
 */
export function relaxedPrices(
  firm: FirmInput,
  vessels: readonly { input: PlanInput; lateAllowed: boolean }[],
  limits: readonly RoomLimit[],
  solver: ProgramSolver,
  stop: RelaxedLimits,
): RelaxedPrices {
  const opened = vessels.map(({ input, lateAllowed }) =>
    relaxedVessel(firm, vesselModel(input), limits, lateAllowed, solver),
  );
  try {
    return search(firm, opened, limits, solver, stop);
  } finally {
    for (const { open } of opened) open.close();
  }
}

function search(
  firm: FirmInput,
  vessels: readonly RelaxedVessel[],
  limits: readonly RoomLimit[],
  solver: ProgramSolver,
  stop: RelaxedLimits,
): RelaxedPrices {
  const beyondMinor = lastResortMinor(firm);
  const columns: MasterColumn[] = [];
  let best = limits.map(() => 0);
  let asked = best;
  let boundMinor = -Infinity;
  let step = 0;
  for (let rounds = 1; ; rounds++) {
    const found = vessels.map((vessel, index) => cheapestColumn(vessel, index, asked, limits.length));
    columns.push(...found.map(({ column }) => column));
    const worth = limits.reduce((sum, { limit }, at) => sum + limit * asked[at], 0);
    const bound = found.reduce((sum, { pricedMinor }) => sum + pricedMinor, 0) - worth;
    if (bound > boundMinor) {
      boundMinor = bound;
      best = asked;
      step = 0;
    } else {
      step = Math.min(step + 1, STEPS.length - 1);
    }
    stop.onRound?.(boundMinor);
    const master = firmMaster(limits, vessels.length, columns, beyondMinor, false);
    const mix = solver.solve(master.program, { timeLimitS: 60, relativeGap: 0 });
    if (mix.values === null || mix.rowDuals === null) throw new Error('The solver found no mix of plans.');
    const isShort = master.beyond.some((column) => mix.values![column] > 1e-6);
    const mixMinor = mix.objective * MINOR_PER_PROGRAM_UNIT;
    const met = mixMinor - boundMinor <= stop.gap * Math.abs(mixMinor);
    if (met || stop.elapsedS() >= stop.untilS)
      return { pricesMinor: best, boundMinor, isShort: isShort && met, rounds };
    const wanted = master.rows.map((row) => Math.max(0, -mix.rowDuals![row] * MINOR_PER_PROGRAM_UNIT));
    asked = wanted.map((price, at) => best[at] + STEPS[step] * (price - best[at]));
  }
}

function relaxedVessel(
  firm: FirmInput,
  model: VesselModel,
  limits: readonly RoomLimit[],
  lateAllowed: boolean,
  solver: ProgramSolver,
): RelaxedVessel {
  const built = vesselProgram(model, {
    formulation: lateAllowed ? 'arcs' : 'covering',
    minimise: 'cost',
    lateAllowed,
    lateDayCostMinor: firm.lateDayCostMinor,
  });
  const uses: RelaxedVessel['uses'] = [];
  const add = (column: number, window: number, kind: string, hours: number, berths: number): void => {
    limits.forEach((limit, at) => {
      if (limit.windowId !== model.windows[window].window.id) return;
      const use = limit.kind === null ? hours : limit.kind === kind ? berths : 0;
      if (use > 0) uses.push({ limit: at, column, use });
    });
  };
  for (const { column, window, kind } of built.visits) {
    add(column, window, kind, model.windows[window].offers.find((offer) => offer.kind === kind)!.hours, 1);
  }
  for (const { column, taskIndex, window, kind } of built.works) {
    add(column, window, kind, model.tasks[taskIndex].work.find((work) => work.kind === kind)!.hours, 0);
  }
  return {
    open: solver.openRelaxed(built.program),
    baseCosts: built.program.costs,
    costs: built.program.costs.slice(),
    uses,
  };
}

function cheapestColumn(
  vessel: RelaxedVessel,
  index: number,
  pricesMinor: readonly number[],
  limitCount: number,
): { column: MasterColumn; pricedMinor: number } {
  vessel.costs.set(vessel.baseCosts);
  for (const { limit, column, use } of vessel.uses) {
    vessel.costs[column] += (pricesMinor[limit] * use) / MINOR_PER_PROGRAM_UNIT;
  }
  const solved = vessel.open.solve(vessel.costs);
  if (solved === null) throw new Error('A vessel has no plan at any price.');
  const uses = Array.from({ length: limitCount }, () => 0);
  for (const { limit, column, use } of vessel.uses) uses[limit] += use * solved.values[column];
  const weight = vessel.baseCosts.reduce((sum, cost, column) => sum + cost * solved.values[column], 0);
  return {
    column: { vessel: index, weightMinor: weight * MINOR_PER_PROGRAM_UNIT, uses },
    pricedMinor: solved.objective * MINOR_PER_PROGRAM_UNIT,
  };
}
