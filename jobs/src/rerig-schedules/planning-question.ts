import type { ChangedPlan, PlanChange } from '@stayledger/shared/rerig-schedule/change-plan';
import type { TaskExplanation } from '@stayledger/shared/rerig-schedule/explain-plan';
import type { FirmVesselAnswer, FirmVesselRequest } from '@stayledger/shared/rerig-schedule/firm-vessel';
import type { SolveLimits } from '@stayledger/shared/rerig-schedule/mixed-integer-program';
import type { PlanInput } from '@stayledger/shared/rerig-schedule/plan-input';
import type { PlanPreference } from '@stayledger/shared/rerig-schedule/plan-vessel';
import type { VesselPlan } from '@stayledger/shared/rerig-schedule/vessel-plan';

/** What a planning thread can be asked about one vessel, with the answer to each. */
export interface PlanningAnswers {
  plan: {
    question: { input: PlanInput; limits?: SolveLimits; preference?: PlanPreference };
    answer: VesselPlan;
  };
  alternatives: {
    question: { input: PlanInput; limits?: SolveLimits };
    answer: Record<PlanPreference, VesselPlan>;
  };
  explain: {
    question: { input: PlanInput; plan: VesselPlan; limits?: SolveLimits };
    answer: TaskExplanation[];
  };
  change: {
    question: { input: PlanInput; plan: VesselPlan; change: PlanChange; limits?: SolveLimits };
    answer: ChangedPlan;
  };
  firmVessel: { question: FirmVesselRequest; answer: FirmVesselAnswer | null };
}

export type PlanningQuestion = {
  [Kind in keyof PlanningAnswers]: { kind: Kind } & PlanningAnswers[Kind]['question'];
}[keyof PlanningAnswers];
