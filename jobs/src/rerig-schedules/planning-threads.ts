import { join } from 'node:path';
import { MessageChannel } from 'node:worker_threads';
import type { FirmInput } from '@stayledger/shared/rerig-schedule/firm-input';
import type { FirmPlan } from '@stayledger/shared/rerig-schedule/firm-plan';
import Piscina from 'piscina';
import type { FirmProgress, FirmTask } from './plan-firm.worker.js';
import type { PlanningAnswers, PlanningQuestion } from './planning-question.js';

/** Threads are plain Node and read what was built, also when the rest runs from its sources (the tests). */
const BUILT_FOLDER = join(__dirname, '../../dist/rerig-schedules');
const IDLE_MS = 30_000;
/** On Linux the priority of a thread alone can be lowered: requests are answered while plans are made. */
const NICE = 15;

/** Where the planning runs: in threads, so that the event loop of the process stays free for people. */
export class PlanningThreads {
  readonly #threads: number;
  readonly #vessels: Piscina<PlanningQuestion, unknown>;
  readonly #firms: Piscina<FirmTask, FirmPlan>;

  /**
   * @param threads at most so many at a time
   * @param options.folder of the thread files, with their ending; the built ones unless given
   * @param options.niceness of the threads, from 0 (as this one) to 19
   */
  constructor(threads: number, options: { folder?: string; ending?: string; niceness?: number } = {}) {
    const { folder = BUILT_FOLDER, ending = '.js', niceness = NICE } = options;
    this.#threads = threads;
    const common = { minThreads: 0, idleTimeout: IDLE_MS, workerData: niceness };
    this.#vessels = new Piscina({
      ...common,
      filename: join(folder, `plan.worker${ending}`),
      maxThreads: threads,
    });
    this.#firms = new Piscina({
      ...common,
      filename: join(folder, `plan-firm.worker${ending}`),
      maxThreads: 1,
    });
  }

  /**
   * Asks about one vessel.
   *
   * @param signal ends the thread at once
   */
  async ask<Kind extends keyof PlanningAnswers>(
    kind: Kind,
    question: PlanningAnswers[Kind]['question'],
    signal?: AbortSignal,
  ): Promise<PlanningAnswers[Kind]['answer']> {
    return (await this.#vessels.run({ kind, ...question } as PlanningQuestion, {
      signal,
    })) as PlanningAnswers[Kind]['answer'];
  }

  /** Plans all vessels of a firm; firms wait for one another. */
  async planFirm(
    firm: FirmInput,
    options: {
      timeLimitS: number;
      targetGap: number;
      signal?: AbortSignal;
      onProgress?: (progress: FirmProgress) => void;
    },
  ): Promise<FirmPlan> {
    const { port1, port2 } = new MessageChannel();
    port1.on('message', options.onProgress ?? (() => undefined));
    try {
      return await this.#firms.run(
        {
          firm,
          timeLimitS: options.timeLimitS,
          targetGap: options.targetGap,
          threads: this.#threads,
          port: port2,
        },
        { transferList: [port2], signal: options.signal },
      );
    } finally {
      port1.close();
    }
  }

  async close(): Promise<void> {
    await Promise.all([this.#vessels.destroy(), this.#firms.destroy()]);
  }
}
