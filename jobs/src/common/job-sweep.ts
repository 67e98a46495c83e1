import { EntityManager } from '@mikro-orm/postgresql';
import {
  type BeforeApplicationShutdown,
  Injectable,
  Logger,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import { JobQueue } from '@stayledger/backend/queue/job-queue';
import { waitingJobs } from './job-leases.js';

const SWEEP_EVERY_MS = 5000;

/** Finds work that nobody was woken for: after a crash, a lost queue, or a lease that ran out. */
@Injectable()
export class JobSweep implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(JobSweep.name);
  private timer: NodeJS.Timeout | null = null;
  private sweeping: Promise<void> | null = null;

  constructor(
    private readonly em: EntityManager,
    private readonly queue: JobQueue,
  ) {}

  onApplicationBootstrap(): void {
    void this.sweep();
    this.timer = setInterval(() => void this.sweep(), SWEEP_EVERY_MS);
  }

  async beforeApplicationShutdown(): Promise<void> {
    if (this.timer) clearInterval(this.timer);
    this.timer = null;
    await this.sweeping;
  }

  /** Wakes a worker for every job that waits. One that is in the queue already is not added twice. */
  sweep(): Promise<void> {
    this.sweeping ??= this.sweepOnce()
      .catch((error: unknown) => {
        const reason = error instanceof Error ? error.message.split('\n')[0] : String(error);
        this.logger.warn(`could not look for waiting jobs: ${reason}`);
      })
      .finally(() => {
        this.sweeping = null;
      });
    return this.sweeping;
  }

  private async sweepOnce(): Promise<void> {
    for (const { id, kind } of await waitingJobs(this.em.fork())) await this.queue.wake(id, kind);
  }
}
