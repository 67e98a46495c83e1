import { setPriority } from 'node:os';
import { changePlan } from '@stayledger/shared/rerig-schedule/change-plan';
import { explainPlan } from '@stayledger/shared/rerig-schedule/explain-plan';
import { firmVessel } from '@stayledger/shared/rerig-schedule/firm-vessel';
import { planAlternatives } from '@stayledger/shared/rerig-schedule/plan-alternatives';
import { planVessel } from '@stayledger/shared/rerig-schedule/plan-vessel';
import { workerData } from 'piscina';
import { loadSolver } from './load-solver.js';
import type { PlanningAnswers, PlanningQuestion } from './planning-question.js';

// Niceness, see PlanningThreads; going back to 0 is not everyone's to do.
if ((workerData as number) > 0) setPriority(0, workerData as number);

/** Answers one question about one vessel, in a thread of its own. */
export default async function answer(
  question: PlanningQuestion,
): Promise<PlanningAnswers[keyof PlanningAnswers]['answer']> {
  const solver = await loadSolver();
  switch (question.kind) {
    case 'plan':
      return planVessel(question.input, solver, question.limits, { preference: question.preference });
    case 'alternatives':
      return planAlternatives(question.input, solver, question.limits);
    case 'explain':
      return explainPlan(question.input, question.plan, solver, question.limits);
    case 'change':
      return changePlan(question.input, question.plan, question.change, solver, question.limits);
    case 'firmVessel':
      return firmVessel(question, solver);
  }
}
