import { dutyNetworks } from './duty-network.js';
import type { Duty, DutyArc } from './duty-network.js';
import type { VisitKind } from './plan-input.js';
import type { MixedIntegerProgram } from './mixed-integer-program.js';
import { ProgramBuilder } from './program-builder.js';
import type { VesselModel } from './vessel-model.js';

/**
 * Two ways to say that no duty runs past its date. 'arcs': each duty is a path through the windows. 'covering': every
 * stretch of windows as long as a life holds at least one doing. The same plans satisfy both, and so do the same relaxed
 * plans: the stretches of one duty are an interval matrix, whose corners are whole. Covering is therefore as tight with a
 * fifth of the columns. Measured on 21 invented vessels of 12 tasks and 24 windows, to a gap of 1 %: 636 columns against
 * 3,300; processor time 40 ms against 92 in the middle, 192 ms against 1,800 at worst. Paths are kept for what stretches
 * cannot say: days late and days given away.
 */
export type Formulation = 'arcs' | 'covering';

/** What a program adds up, and bounds. */
export type Measure = 'cost' | 'visits' | 'late-days' | 'unused-days';

/** Money is handed to the solver in hundreds of minor units: figures of similar size keep its arithmetic exact. */
export const MINOR_PER_PROGRAM_UNIT = 100;

/** Prices a firm's other vessels put on a window's room, minor units; by window id. */
export interface WindowPrices {
  perHourMinor: ReadonlyMap<string, number>;
  perBerthMinor: ReadonlyMap<string, Partial<Record<VisitKind, number>>>;
}

/** Room left in windows; a window left out has no limit. */
export interface WindowRoom {
  hours: ReadonlyMap<string, number>;
  berths: ReadonlyMap<string, Partial<Record<VisitKind, number>>>;
}

/** What program to build. */
export interface ProgramSettings {
  formulation: Formulation;
  minimise: Measure;
  /** Upper bounds on other measures; cost in minor units. */
  atMost?: Partial<Record<Measure, number>>;
  /** True where a duty may run later than it must, so that another one or a decision can stand. */
  lateAllowed?: boolean;
  /** Cost of a day late, minor units, on top of the plan's cost; 0 unless given. */
  lateDayCostMinor?: number;
  prices?: WindowPrices;
  room?: WindowRoom;
}

/** A program with the meaning of its columns. */
export interface VesselProgram {
  program: MixedIntegerProgram;
  visits: { column: number; window: number; kind: VisitKind }[];
  works: { column: number; taskIndex: number; window: number; kind: VisitKind }[];
  arcs: { column: number; duty: Duty; arc: DutyArc }[];
  duties: Duty[];
  /** What a person settled that cannot be done at all, in words; left out of the program. */
  impossible: string[];
}

/**
 * The mixed integer program of one vessel: a yes-or-no column per window and kind of visit, one per task, window and
 * kind of visit that allows it; at most one kind per window; no work without its visit; needed work beside the work
 * that needs it; decisions as fixed columns; duties as paths or as covered stretches.
 *
 * @param model the vessel in numbers
 * @param settings see {@link ProgramSettings}; 'covering' is used for duties that can be met in time, others stay paths
 */
export function vesselProgram(model: VesselModel, settings: ProgramSettings): VesselProgram {
  const builder = new ProgramBuilder();
  const lateAllowed = settings.lateAllowed ?? false;
  const duties = dutyNetworks(model, lateAllowed ? 'all' : 'least-late');
  const sums: Record<Measure, [number, number][]> = {
    cost: [],
    visits: [],
    'late-days': [],
    'unused-days': [],
  };
  const weights = settings.minimise === 'cost' ? 1 / MINOR_PER_PROGRAM_UNIT : 0;

  const visits: VesselProgram['visits'] = [];
  model.windows.forEach(({ window: { id }, offers }, window) => {
    const row: [number, number][] = [];
    for (const offer of offers) {
      const cost = offer.costMinor + offer.contingencyMinor;
      const price =
        (settings.prices?.perBerthMinor.get(id)?.[offer.kind] ?? 0) +
        (settings.prices?.perHourMinor.get(id) ?? 0) * offer.hours;
      const column = builder.addChoice(settings.minimise === 'visits' ? 1 : (cost + price) * weights);
      if (offer.locked) builder.fix(column, 1);
      else if ((settings.room?.berths.get(id)?.[offer.kind] ?? 1) < 1) builder.fix(column, 0);
      sums.cost.push([column, cost / MINOR_PER_PROGRAM_UNIT]);
      sums.visits.push([column, 1]);
      visits.push({ column, window, kind: offer.kind });
      row.push([column, 1]);
    }
    if (row.length > 1) builder.addRow(-Infinity, 1, row);
  });

  const visitColumn = new Map(visits.map((visit) => [`${visit.window} ${visit.kind}`, visit.column]));
  const coupled = coupledTasks(model, settings);
  const works: VesselProgram['works'] = [];
  model.tasks.forEach(({ work, doneDays }, taskIndex) => {
    for (const offered of work) {
      doneDays.forEach((day, window) => {
        const visit = visitColumn.get(`${window} ${offered.kind}`);
        if (visit === undefined || Number.isNaN(day)) return;
        const cost = offered.costMinor + offered.contingencyMinor;
        const price =
          (settings.prices?.perHourMinor.get(model.windows[window].window.id) ?? 0) * offered.hours;
        const column = coupled.has(taskIndex)
          ? builder.addChoice((cost + price) * weights)
          : builder.addAmount((cost + price) * weights, 0, 1);
        sums.cost.push([column, cost / MINOR_PER_PROGRAM_UNIT]);
        builder.addRow(-Infinity, 0, [
          [column, 1],
          [visit, -1],
        ]);
        works.push({ column, taskIndex, window, kind: offered.kind });
      });
    }
  });
  const worksAt = new Map<string, number[]>();
  for (const { column, taskIndex, window } of works) {
    const key = `${taskIndex} ${window}`;
    worksAt.set(key, [...(worksAt.get(key) ?? []), column]);
  }
  const done = (taskIndex: number, window: number): number[] => worksAt.get(`${taskIndex} ${window}`) ?? [];

  addNeeds(builder, model, done);
  const impossible = addDecisions(builder, model, visits, done);
  if (settings.room !== undefined) addRoom(builder, model, settings.room, visits, works);

  const arcs: VesselProgram['arcs'] = [];
  for (const duty of duties) {
    const covered = settings.formulation === 'covering' && !lateAllowed && duty.leastLateDays === 0;
    // Counting days given away takes the steps themselves.
    if (covered && settings.minimise !== 'unused-days' && settings.atMost?.['unused-days'] === undefined) {
      addCoveringRows(builder, model, duty, done);
    } else {
      arcs.push(...addPath(builder, model, duty, done, settings));
    }
  }
  for (const { column, arc } of arcs) {
    if (arc.lateDays > 0) sums['late-days'].push([column, arc.lateDays]);
    if (arc.unusedDays > 0) sums['unused-days'].push([column, arc.unusedDays]);
  }
  for (const [measure, limit] of Object.entries(settings.atMost ?? {})) {
    const bound = measure === 'cost' ? limit / MINOR_PER_PROGRAM_UNIT : limit;
    builder.addRow(-Infinity, bound, sums[measure as Measure]);
  }
  return { program: builder.build(), visits, works, arcs, duties, impossible };
}

/**
 * Tasks whose work has to be a whole column. With the visits settled every other duty is a shortest path (or a set of
 * stretches, an interval matrix), whose cheapest solutions are whole by themselves; leaving the columns free makes the
 * program about four times as fast.
 */
function coupledTasks(model: VesselModel, settings: ProgramSettings): Set<number> {
  const all = settings.room !== undefined || settings.atMost !== undefined;
  const coupled = new Set<number>();
  const byId = new Map(model.tasks.map(({ task }, index) => [task.id, index]));
  model.tasks.forEach(({ task, dueDay, againAfterDays, doneDays }, index) => {
    const others = [...task.needs, ...task.alsoDoneBy];
    // Stretches that must be covered only if something was done at their beginning break the interval matrix.
    const conditional = doneDays.some((day) => dueDay !== null && dueDay > day + againAfterDays);
    if (all || others.length > 0 || conditional) coupled.add(index);
    for (const id of others) {
      const other = byId.get(id);
      if (other !== undefined) coupled.add(other);
    }
  });
  return coupled;
}

function addNeeds(
  builder: ProgramBuilder,
  model: VesselModel,
  done: (taskIndex: number, window: number) => number[],
): void {
  model.tasks.forEach(({ task, doneDays }, taskIndex) => {
    for (const id of task.needs) {
      const needed = model.tasks.findIndex((other) => other.task.id === id);
      doneDays.forEach((_, window) => {
        const columns = done(taskIndex, window);
        if (columns.length === 0) return;
        builder.addRow(-Infinity, 0, [
          ...columns.map((column) => [column, 1] as const),
          ...done(needed, window).map((column) => [column, -1] as const),
        ]);
      });
    }
  });
}

function addDecisions(
  builder: ProgramBuilder,
  model: VesselModel,
  visits: VesselProgram['visits'],
  done: (taskIndex: number, window: number) => number[],
): string[] {
  const impossible: string[] = [];
  const windowOf = (id: string): number => model.windows.findIndex(({ window }) => window.id === id);
  for (const lock of model.input.decisions.locked) {
    const window = windowOf(lock.windowId);
    if (!visits.some((visit) => visit.window === window && visit.kind === lock.kind)) {
      impossible.push(
        `The visit settled for window ${lock.windowId} is over, or the price list has no such visit.`,
      );
    }
  }
  for (const { taskId, windowId } of model.input.decisions.pinned) {
    const taskIndex = model.tasks.findIndex(({ task }) => task.id === taskId);
    const columns = done(taskIndex, windowOf(windowId));
    if (columns.length > 0) {
      builder.addRow(
        1,
        1,
        columns.map((column) => [column, 1] as const),
      );
    } else {
      const name = model.tasks[taskIndex]?.task.name ?? taskId;
      impossible.push(
        `${name} cannot be done in window ${windowId}: no visit there allows it, or its material comes too late.`,
      );
    }
  }
  return impossible;
}

function addRoom(
  builder: ProgramBuilder,
  model: VesselModel,
  room: WindowRoom,
  visits: VesselProgram['visits'],
  works: VesselProgram['works'],
): void {
  model.windows.forEach(({ window: { id }, offers }, window) => {
    const hours = room.hours.get(id);
    if (hours === undefined) return;
    const row: [number, number][] = [];
    for (const visit of visits) {
      if (visit.window !== window) continue;
      row.push([visit.column, offers.find(({ kind }) => kind === visit.kind)!.hours]);
    }
    for (const work of works) {
      if (work.window !== window) continue;
      const offered = model.tasks[work.taskIndex].work.find(({ kind }) => kind === work.kind)!;
      row.push([work.column, offered.hours]);
    }
    // A visit that stands takes its hours even where others have left none.
    const lockedHours = offers.reduce((sum, offer) => sum + (offer.locked ? offer.hours : 0), 0);
    builder.addRow(
      -Infinity,
      Math.max(hours, lockedHours),
      row.filter(([, hoursOfColumn]) => hoursOfColumn > 0),
    );
  });
}

/** Columns whose doing counts for a duty in a window. */
function doingOf(
  duty: Duty,
  window: number,
  done: (taskIndex: number, window: number) => number[],
): number[] {
  return (duty.doers.get(window) ?? []).flatMap((taskIndex) => done(taskIndex, window));
}

function addPath(
  builder: ProgramBuilder,
  model: VesselModel,
  duty: Duty,
  done: (taskIndex: number, window: number) => number[],
  settings: ProgramSettings,
): VesselProgram['arcs'] {
  const end = model.windows.length;
  const lateWeight =
    settings.minimise === 'cost' ? (settings.lateDayCostMinor ?? 0) / MINOR_PER_PROGRAM_UNIT : 0;
  const arcs = duty.arcs.map((arc) => {
    const cost =
      settings.minimise === 'late-days'
        ? arc.lateDays
        : settings.minimise === 'unused-days'
          ? arc.unusedDays
          : arc.lateDays * lateWeight;
    return { column: builder.addAmount(cost, 0, 1), duty, arc };
  });
  builder.addRow(
    1,
    1,
    arcs.filter(({ arc }) => arc.from === -1).map(({ column }) => [column, 1] as const),
  );
  for (const node of duty.nodes) {
    const into = arcs.filter(({ arc }) => arc.to === node && arc.to !== end);
    const out = arcs.filter(({ arc }) => arc.from === node);
    if (into.length === 0 && out.length === 0) continue;
    builder.addRow(0, 0, [
      ...into.map(({ column }) => [column, 1] as const),
      ...out.map(({ column }) => [column, -1] as const),
    ]);
    builder.addRow(-Infinity, 0, [
      ...into.map(({ column }) => [column, 1] as const),
      ...doingOf(duty, node, done).map((column) => [column, -1] as const),
    ]);
  }
  // Doing a task before its first date starts a new life. Where that life is the shorter one, it must not be passed over.
  const { dueDay, doneDays, againAfterDays } = model.tasks[duty.taskIndex];
  for (const node of duty.nodes.filter((candidate) => doneDays[candidate] + againAfterDays < dueDay!)) {
    const passing = arcs.filter(({ arc }) => arc.from === -1 && arc.to > node);
    for (const taskIndex of duty.doers.get(node) ?? []) {
      builder.addRow(-Infinity, 1, [
        ...passing.map(({ column }) => [column, 1] as const),
        ...done(taskIndex, node).map((column) => [column, 1] as const),
      ]);
    }
  }
  return arcs;
}

function addCoveringRows(
  builder: ProgramBuilder,
  model: VesselModel,
  duty: Duty,
  done: (taskIndex: number, window: number) => number[],
): void {
  const { dueDay, doneDays, againAfterDays } = model.tasks[duty.taskIndex];
  const cover = (after: number, until: number): [number, number][] =>
    duty.nodes
      .filter((node) => node > after && doneDays[node] <= until)
      .flatMap((node) => doingOf(duty, node, done).map((column): [number, number] => [column, 1]));
  if (dueDay! < model.horizonDay) builder.addRow(1, Infinity, cover(-1, dueDay!));
  for (const node of duty.nodes) {
    const until = doneDays[node] + againAfterDays;
    if (until >= model.horizonDay) continue;
    // Something was done, or first falls due, within this stretch: it must hold a doing in any case. Otherwise it must
    // hold one only if the stretch begins with one.
    const covering = cover(node, until);
    if (dueDay! <= until) {
      builder.addRow(1, Infinity, covering);
      continue;
    }
    for (const taskIndex of duty.doers.get(node) ?? []) {
      builder.addRow(0, Infinity, [
        ...covering,
        ...done(taskIndex, node).map((column): [number, number] => [column, -1]),
      ]);
    }
  }
}
