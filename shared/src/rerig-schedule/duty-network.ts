import type { VesselModel } from './vessel-model.js';

/** One step of a duty: from its last doing (or from now) to its next (or to the end of the horizon). */
export interface DutyArc {
  /** Window of the last doing; -1: not yet done. */
  from: number;
  /** Window of the next doing; the number of windows: not again within the horizon. */
  to: number;
  /** Days past the due date this step runs. */
  lateDays: number;
  /** Days of its life given away by doing it before it is due. */
  unusedDays: number;
}

/** What a task that comes due by itself asks for: a path of steps from now to the end of the horizon. */
export interface Duty {
  /** Number of the task in the model. */
  taskIndex: number;
  /** Windows in which it can be done, ascending. */
  nodes: number[];
  /** Tasks, by number, whose doing counts in each window; the task itself where it can be done there. */
  doers: Map<number, number[]>;
  arcs: DutyArc[];
  /** Days late that no plan can avoid, whatever the other tasks do. */
  leastLateDays: number;
}

/**
 * The duties of a vessel. Each arc carries the days it is late, so the least lateness of a duty is its shortest path.
 *
 * @param model the vessel in numbers
 * @param keep 'least-late': only arcs that lie on a path of least lateness, so that every path left is one;
 *   'all': every arc, for plans in which one duty has to give way to another
 */
export function dutyNetworks(model: VesselModel, keep: 'least-late' | 'all'): Duty[] {
  return model.tasks.flatMap(({ dueDay }, taskIndex) =>
    dueDay === null ? [] : [dutyNetwork(model, taskIndex, dueDay, keep)],
  );
}

function dutyNetwork(
  model: VesselModel,
  taskIndex: number,
  dueDay: number,
  keep: 'least-late' | 'all',
): Duty {
  const { doneDays, againAfterDays } = model.tasks[taskIndex];
  const doers = doersOf(model, taskIndex);
  const nodes = [...doers.keys()].sort((one, other) => one - other);
  const end = model.windows.length;
  const arcs: DutyArc[] = [];
  const step = (from: number, to: number, due: number, day: number): void => {
    // At the end of the horizon nothing is given away: what is left of a life goes on being used.
    const unusedDays = to === end ? 0 : Math.max(0, Math.min(due, model.horizonDay) - day);
    arcs.push({ from, to, lateDays: Math.max(0, day - due), unusedDays });
  };
  step(-1, end, dueDay, model.horizonDay);
  nodes.forEach((node, at) => {
    step(-1, node, dueDay, doneDays[node]);
    for (const later of nodes.slice(at + 1))
      step(node, later, doneDays[node] + againAfterDays, doneDays[later]);
    step(node, end, doneDays[node] + againAfterDays, model.horizonDay);
  });
  const { fromStart, toEnd } = leastLateness(arcs, end);
  const leastLateDays = fromStart.get(end) ?? 0;
  return {
    taskIndex,
    nodes,
    doers,
    arcs:
      keep === 'all'
        ? arcs
        : arcs.filter(
            ({ from, to, lateDays }) => fromStart.get(from)! + lateDays + toEnd.get(to)! === leastLateDays,
          ),
    leastLateDays,
  };
}

/** A task that another task also does counts only where both can be done on the same day. */
function doersOf(model: VesselModel, taskIndex: number): Map<number, number[]> {
  const { task, doneDays } = model.tasks[taskIndex];
  const doers = new Map<number, number[]>();
  doneDays.forEach((day, window) => {
    if (Number.isNaN(day)) return;
    const others = task.alsoDoneBy
      .map((id) => model.tasks.findIndex((other) => other.task.id === id))
      .filter((other) => other >= 0 && model.tasks[other].doneDays[window] === day);
    doers.set(window, [taskIndex, ...others]);
  });
  return doers;
}

/** Least days late from the start to every node, and from every node to the end. Arcs only ever lead forward. */
function leastLateness(
  arcs: readonly DutyArc[],
  end: number,
): Record<'fromStart' | 'toEnd', Map<number, number>> {
  const forward = [...arcs].sort((one, other) => one.to - other.to);
  const fromStart = new Map([[-1, 0]]);
  for (const { from, to, lateDays } of forward) {
    const late = fromStart.get(from)! + lateDays;
    if (late < (fromStart.get(to) ?? Infinity)) fromStart.set(to, late);
  }
  const toEnd = new Map([[end, 0]]);
  for (const { from, to, lateDays } of [...arcs].sort((one, other) => other.from - one.from)) {
    const late = toEnd.get(to)! + lateDays;
    if (late < (toEnd.get(from) ?? Infinity)) toEnd.set(from, late);
  }
  return { fromStart, toEnd };
}
