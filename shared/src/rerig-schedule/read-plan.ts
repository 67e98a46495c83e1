import { dayOfNumber } from '../fatigue/life/days.js';
import type { VisitKind } from './plan-input.js';
import type { LateTask, PlannedTask, PlannedVisit, VesselPlan } from './vessel-plan.js';
import type { ModelTask, OfferedVisit, OfferedWork, VesselModel } from './vessel-model.js';

/** What a solution settles: windows and tasks by their number in the model. */
export interface VesselChoice {
  visits: { window: number; kind: VisitKind }[];
  works: { taskIndex: number; window: number; kind: VisitKind }[];
}

/** How one duty fares under a choice. */
export interface DutyOutcome {
  taskIndex: number;
  /** Each doing that counts, in order, with the day it was due; null window: not done again by the horizon's end. */
  steps: { window: number | null; dueDay: number; doneDay: number; lateDays: number }[];
  lateDays: number;
}

/**
 * The plan in days and money that a choice of visits and work amounts to. Every figure is added up anew in whole minor
 * units and whole days from the input, none is taken from the solver's arithmetic.
 */
export function readPlan(
  model: VesselModel,
  choice: VesselChoice,
  lateTasks: LateTask[],
  remarks: string[],
): Omit<VesselPlan, 'proof'> {
  const outcomes = dutyOutcomes(model, choice);
  const visits = [...choice.visits]
    .sort((one, other) => one.window - other.window)
    .map((visit) => plannedVisit(model, choice, outcomes, visit.window, visit.kind));
  return {
    asOfOn: model.input.asOfOn,
    horizonEndOn: model.input.horizonEndOn,
    currency: model.input.currency,
    visits,
    totalMinor: sum(visits.map(({ totalMinor }) => totalMinor)),
    hours: sum(visits.map(({ hours }) => hours)),
    lateDays: sum(outcomes.map(({ lateDays }) => lateDays)),
    lateTasks,
    withoutDate: model.tasks.filter(({ dueDay }) => dueDay === null).map(({ task }) => task.name),
    remarks,
  };
}

/** What a choice costs, whole minor units, visits, tasks and contingency together. */
export function costOfChoice(model: VesselModel, choice: VesselChoice): number {
  const visits = choice.visits.map(({ window, kind }) => offerOf(model, window, kind));
  const works = choice.works.map(({ taskIndex, kind }) => workOf(model.tasks[taskIndex], kind));
  return sum([...visits, ...works].map(({ costMinor, contingencyMinor }) => costMinor + contingencyMinor));
}

/** How every duty fares under a choice. */
export function dutyOutcomes(model: VesselModel, choice: VesselChoice): DutyOutcome[] {
  return model.tasks.flatMap(({ task, dueDay, doneDays, againAfterDays }, taskIndex) => {
    if (dueDay === null) return [];
    const counts = (other: number, window: number): boolean =>
      other === taskIndex ||
      (task.alsoDoneBy.includes(model.tasks[other].task.id) &&
        model.tasks[other].doneDays[window] === doneDays[window]);
    const windows = [
      ...new Set(
        choice.works.filter((work) => counts(work.taskIndex, work.window)).map(({ window }) => window),
      ),
    ];
    let due = dueDay;
    const steps: DutyOutcome['steps'] = windows
      .sort((one, other) => one - other)
      .map((window) => {
        const doneDay = doneDays[window];
        const step = { window, dueDay: due, doneDay, lateDays: Math.max(0, doneDay - due) };
        due = doneDay + againAfterDays;
        return step;
      });
    if (due < model.horizonDay) {
      steps.push({ window: null, dueDay: due, doneDay: model.horizonDay, lateDays: model.horizonDay - due });
    }
    return [{ taskIndex, steps, lateDays: sum(steps.map(({ lateDays }) => lateDays)) }];
  });
}

function plannedVisit(
  model: VesselModel,
  choice: VesselChoice,
  outcomes: DutyOutcome[],
  window: number,
  kind: VisitKind,
): PlannedVisit {
  const open = model.windows[window];
  const offer = offerOf(model, window, kind);
  const tasks = choice.works
    .filter((work) => work.window === window)
    .sort((one, other) => one.taskIndex - other.taskIndex)
    .map((work) =>
      plannedTask(model, outcomes, work.taskIndex, window, workOf(model.tasks[work.taskIndex], kind)),
    );
  const dues = tasks.flatMap(({ dueOn, lateDays }) => (dueOn === null || lateDays > 0 ? [] : [dueOn]));
  const startOn = dayOfNumber(open.startDay);
  return {
    windowId: open.window.id,
    kind,
    startOn,
    doneByOn: [open.window.closesOn, ...dues].reduce((least, day) => (day < least ? day : least)),
    locked: offer.locked,
    visitCostMinor: offer.costMinor,
    visitContingencyMinor: offer.contingencyMinor,
    tasks,
    hours: offer.hours + sum(tasks.map(({ hours }) => hours)),
    totalMinor:
      offer.costMinor +
      offer.contingencyMinor +
      sum(tasks.map(({ costMinor, contingencyMinor }) => costMinor + contingencyMinor)),
  };
}

function plannedTask(
  model: VesselModel,
  outcomes: DutyOutcome[],
  taskIndex: number,
  window: number,
  work: OfferedWork,
): PlannedTask {
  const { task, doneDays, againAfterDays } = model.tasks[taskIndex];
  const step = outcomes
    .find((outcome) => outcome.taskIndex === taskIndex)
    ?.steps.find((candidate) => candidate.window === window);
  const doneDay = doneDays[window];
  const orderDay = task.leadDays > 0 ? doneDay - task.leadDays - model.input.orderMarginDays : null;
  return {
    taskId: task.id,
    name: task.name,
    partIds: task.partIds,
    action: task.action,
    ground: task.ground,
    dueOn: step === undefined ? null : dayOfNumber(step.dueDay),
    doneOn: dayOfNumber(doneDay),
    lateDays: step?.lateDays ?? 0,
    nextDueOn: Number.isFinite(againAfterDays) ? dayOfNumber(doneDay + againAfterDays) : null,
    orderByOn: orderDay === null ? null : dayOfNumber(orderDay),
    orderNow: orderDay !== null && orderDay < model.asOfDay,
    costMinor: work.costMinor,
    contingencyMinor: work.contingencyMinor,
    hours: work.hours,
  };
}

function offerOf(model: VesselModel, window: number, kind: VisitKind): OfferedVisit {
  return model.windows[window].offers.find((offer) => offer.kind === kind)!;
}

function workOf(modelTask: ModelTask, kind: VisitKind): OfferedWork {
  return modelTask.work.find((work) => work.kind === kind)!;
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
