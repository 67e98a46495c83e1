import { Process, Processor } from '@nestjs/bull';
import { jobPayloadSchema, LOAD_LOGS_QUEUE, PLAN_RERIG } from '@stayledger/shared/queues/load-logs.queue';
import type { Job } from 'bull';
import { PlanningRunner } from './planning-runner.js';

/** Woken by the queue, which carries nothing but the id of the row that is the work. */
@Processor(LOAD_LOGS_QUEUE)
export class PlanRerigProcessor {
  constructor(private readonly runner: PlanningRunner) {}

  @Process({ name: PLAN_RERIG, concurrency: 2 })
  async plan({ data }: Job<unknown>): Promise<void> {
    const { jobId } = jobPayloadSchema.parse(data);
    await this.runner.run(jobId);
  }
}
