import type { TaskGround, VisitKind } from './plan-input.js';

/** A task in a planned visit. Money in minor units. */
export interface PlannedTask {
  taskId: string;
  name: string;
  partIds: readonly string[];
  action: 'replace' | 'inspect';
  ground: TaskGround;
  /** Day it falls due, as known when this doing was planned; null where another task asked for it. */
  dueOn: string | null;
  /** Day on which it counts as done. */
  doneOn: string;
  lateDays: number;
  /** Day it falls due next; null: not within any horizon. */
  nextDueOn: string | null;
  /** Last day to order the material with its margin; null where nothing is ordered. */
  orderByOn: string | null;
  /** True where that day is past already. */
  orderNow: boolean;
  costMinor: number;
  contingencyMinor: number;
  hours: number;
}

/** A yard visit of the plan. */
export interface PlannedVisit {
  windowId: string;
  kind: VisitKind;
  /** First day of the work. */
  startOn: string;
  /** Day by which everything in it must be done: the window's end, or the earliest due date if that is sooner. */
  doneByOn: string;
  locked: boolean;
  /** Of the visit itself: lifts, storage, travel. */
  visitCostMinor: number;
  visitContingencyMinor: number;
  tasks: PlannedTask[];
  hours: number;
  /** Visit, tasks and contingency. */
  totalMinor: number;
}

/** Why a task runs past its date in the least-late plan. */
export type LateReason =
  | 'overdue-already'
  | 'no-window-in-time'
  | 'windows-too-far-apart'
  | 'nothing-allows-it'
  | 'settled-by-hand'
  | 'gives-way';

/** A task that no plan, or not this one, keeps within its date. */
export interface LateTask {
  taskId: string;
  name: string;
  dueOn: string;
  /** Null where it is not done within the horizon at all. */
  doneOn: string | null;
  lateDays: number;
  reason: LateReason;
  /** One sentence for the person who asks why. */
  words: string;
}

/** How good the plan is known to be. */
export interface PlanProof {
  /** 'time-limit': the solver stopped before it reached the gap asked for. */
  ended: 'proven' | 'time-limit';
  /** No plan of the same lateness costs less, minor units. */
  boundMinor: number;
  /** (total - bound) / total, 0 where the total is 0. */
  gap: number;
}

/** The plan of one vessel. */
export interface VesselPlan {
  asOfOn: string;
  horizonEndOn: string;
  currency: string;
  visits: PlannedVisit[];
  totalMinor: number;
  hours: number;
  /** Sum over tasks of days past their dates; 0 in a plan that can be accepted as it is. */
  lateDays: number;
  lateTasks: LateTask[];
  /** Names of tasks without a date, which no plan can place by themselves. */
  withoutDate: string[];
  proof: PlanProof;
  /** What the planner left out or could not follow, one sentence each. */
  remarks: string[];
}
