import { Process, Processor } from '@nestjs/bull';
import { COUNT_LOAD_LOG, jobPayloadSchema, LOAD_LOGS_QUEUE } from '@stayledger/shared/queues/load-logs.queue';
import type { Job } from 'bull';
import { CountingRunner } from './counting-runner.js';

/** Woken by the queue, which carries nothing but the id of the row that is the work. */
@Processor(LOAD_LOGS_QUEUE)
export class CountLoadLogProcessor {
  constructor(private readonly runner: CountingRunner) {}

  // More wait here than threads are there: claiming is cheap, and the pool lets no more in than it has room for.
  @Process({ name: COUNT_LOAD_LOG, concurrency: 4 })
  async count({ data }: Job<unknown>): Promise<void> {
    const { jobId } = jobPayloadSchema.parse(data);
    await this.runner.run(jobId);
  }
}
