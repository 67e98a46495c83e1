import { setPriority } from 'node:os';
import { extname, join } from 'node:path';
import type { MessagePort } from 'node:worker_threads';
import type { FirmInput } from '@stayledger/shared/rerig-schedule/firm-input';
import type { FirmPlan } from '@stayledger/shared/rerig-schedule/firm-plan';
import type { FirmVesselAnswer } from '@stayledger/shared/rerig-schedule/firm-vessel';
import { planFirm } from '@stayledger/shared/rerig-schedule/plan-firm';
import Piscina, { workerData } from 'piscina';
import { loadSolver } from './load-solver.js';
import type { PlanningQuestion } from './planning-question.js';

// Niceness, see PlanningThreads; going back to 0 is not everyone's to do.
if ((workerData as number) > 0) setPriority(0, workerData as number);

export interface FirmTask {
  firm: FirmInput;
  timeLimitS: number;
  targetGap: number;
  /** Threads for single vessels, beside the one that holds them together. */
  threads: number;
  /** Receives the rounds and the bound so far. */
  port: MessagePort;
}

export interface FirmProgress {
  round: number;
  boundMinor: number;
}

/**
 * Plans a firm in a thread of its own, which finds the prices; vessels are solved whole in further threads. The two take
 * turns rather than compete.
 */
export default async function plan({
  firm,
  timeLimitS,
  targetGap,
  threads,
  port,
}: FirmTask): Promise<FirmPlan> {
  const began = performance.now();
  const vessels = new Piscina<PlanningQuestion, FirmVesselAnswer | null>({
    // Beside this file, built or not.
    filename: join(__dirname, `plan.worker${extname(__filename)}`),
    minThreads: threads,
    maxThreads: threads,
    workerData: workerData as number,
  });
  try {
    return await planFirm(firm, {
      timeLimitS,
      targetGap,
      elapsedS: () => (performance.now() - began) / 1000,
      solver: await loadSolver(),
      askVessel: (request) => vessels.run({ kind: 'firmVessel', ...request }),
      onProgress: (progress) => port.postMessage(progress satisfies FirmProgress),
    });
  } finally {
    await vessels.destroy();
  }
}
