import { dayNumber } from '../fatigue/life/days.js';
import type { PlanInput, PlanTask, PlanWindow, VisitKind, WorkTerms } from './plan-input.js';
import { VISIT_KINDS } from './plan-input.js';

/** A kind of visit on offer in a window, with everything a visit of that kind costs by itself. */
export interface OfferedVisit {
  kind: VisitKind;
  costMinor: number;
  contingencyMinor: number;
  hours: number;
  locked: boolean;
}

/** A window as the planner sees it: days as numbers, past days cut off. */
export interface OpenWindow {
  window: PlanWindow;
  /** First day on which work can begin, as a day number. */
  startDay: number;
  closeDay: number;
  offers: OfferedVisit[];
}

/** Work of one task in one kind of visit. */
export interface OfferedWork {
  kind: VisitKind;
  costMinor: number;
  contingencyMinor: number;
  hours: number;
}

/** A task as the planner sees it. */
export interface ModelTask {
  task: PlanTask;
  /** Null where nothing asks for the task by itself. */
  dueDay: number | null;
  againAfterDays: number;
  work: OfferedWork[];
  /** Earliest day the work can be done in each window (material at hand); NaN where it cannot. */
  doneDays: number[];
}

/** One vessel's plan in numbers. */
export interface VesselModel {
  input: PlanInput;
  asOfDay: number;
  horizonDay: number;
  windows: OpenWindow[];
  tasks: ModelTask[];
}

/**
 * Turns the plan's input into numbers: windows that are over or lie beyond the horizon drop out, the running one begins
 * today, contingency is rounded to whole minor units item by item so that sums stay exact.
 *
 * A task counts as done on the first day of its window, or on the day its material can be there if that is later. Its
 * next life runs from that day.
 *
 * @throws RangeError for days that are not calendar days
 */
export function vesselModel(input: PlanInput): VesselModel {
  const asOfDay = dayNumber(input.asOfOn);
  const horizonDay = dayNumber(input.horizonEndOn);
  const windows = input.windows
    .map((window) => openWindow(window, input, asOfDay))
    .filter((window) => window.closeDay >= asOfDay && window.startDay <= horizonDay)
    .sort((one, other) => one.startDay - other.startDay || one.closeDay - other.closeDay);
  return {
    input,
    asOfDay,
    horizonDay,
    windows,
    tasks: input.tasks.map((task) => modelTask(task, input, windows, asOfDay)),
  };
}

/** Contingency on an amount of a visit's bill, whole minor units. */
export function contingencyOf(costMinor: number, kind: VisitKind, share: number): number {
  return kind === 'aloft' ? 0 : Math.round(costMinor * share);
}

function openWindow(window: PlanWindow, input: PlanInput, asOfDay: number): OpenWindow {
  const { locked, barred } = input.decisions;
  const lockedKind = locked.find((visit) => visit.windowId === window.id)?.kind ?? null;
  const isBarred = (kind: VisitKind): boolean =>
    barred.some((bar) => bar.windowId === window.id && (bar.kind === undefined || bar.kind === kind));
  const offers = VISIT_KINDS.flatMap((kind): OfferedVisit[] => {
    const terms = input.visitTerms[kind];
    // A visit somebody has booked stands, alone in its window, whatever the calendar says about its kind.
    const stands = lockedKind === null ? window.kinds.includes(kind) && !isBarred(kind) : kind === lockedKind;
    if (terms === undefined || !stands) return [];
    const costMinor = window.visitCostMinor?.[kind] ?? terms.costMinor;
    return [
      {
        kind,
        costMinor,
        contingencyMinor: contingencyOf(costMinor, kind, input.contingencyShare),
        hours: terms.hours,
        locked: kind === lockedKind,
      },
    ];
  });
  return {
    window,
    startDay: Math.max(dayNumber(window.opensOn), asOfDay),
    closeDay: dayNumber(window.closesOn),
    offers,
  };
}

function modelTask(task: PlanTask, input: PlanInput, windows: OpenWindow[], asOfDay: number): ModelTask {
  const work = VISIT_KINDS.flatMap((kind): OfferedWork[] => {
    const terms: WorkTerms | undefined = task.terms[kind];
    if (terms === undefined) return [];
    return [
      {
        kind,
        costMinor: terms.costMinor,
        contingencyMinor: contingencyOf(terms.costMinor, kind, input.contingencyShare),
        hours: terms.hours,
      },
    ];
  });
  const doneDays = windows.map((window) => {
    const kept = input.decisions.kept.some(
      (keep) => keep.taskId === task.id && keep.windowId === window.window.id,
    );
    const offered = window.offers.some((offer) => work.some(({ kind }) => kind === offer.kind));
    const doneDay = Math.max(window.startDay, asOfDay + task.leadDays);
    return offered && !kept && doneDay <= window.closeDay ? doneDay : NaN;
  });
  return {
    task,
    dueDay: task.dueOn === null ? null : dayNumber(task.dueOn),
    againAfterDays: task.againAfterDays ?? Infinity,
    work,
    doneDays,
  };
}
