import { EntityManager } from '@mikro-orm/postgresql';
import { Inject, Injectable, Logger, type BeforeApplicationShutdown } from '@nestjs/common';
import { Clock } from '@stayledger/backend/persistence';
import { LOG_STORAGE, type LogStorage } from '@stayledger/backend/storage/log-storage';
import { claimJob, type HeldJob, LeaseLostError, MAX_ATTEMPTS, returnJob } from '../common/job-leases.js';
import { countLoadLog, refuse } from './count-load-log.js';
import { CountingPool } from './counting-pool.js';

const RETRY_PAUSE_S = 5;

/** Works off single jobs: claims, counts, and decides what becomes of a job that did not succeed. */
@Injectable()
export class CountingRunner implements BeforeApplicationShutdown {
  private readonly logger = new Logger('count-load-log');
  private readonly stopping = new AbortController();
  private readonly running = new Set<Promise<void>>();

  constructor(
    private readonly em: EntityManager,
    @Inject(CountingPool) private readonly pool: Pick<CountingPool, 'count'>,
    private readonly clock: Clock,
    @Inject(LOG_STORAGE) private readonly storage: LogStorage,
  ) {}

  /** Does nothing when the job is done or another worker holds it. Never throws for what happens to the job. */
  async run(jobId: string): Promise<void> {
    if (this.stopping.signal.aborted) return;
    const work = this.claimAndCount(jobId);
    this.running.add(work);
    try {
      await work;
    } finally {
      this.running.delete(work);
    }
  }

  /** Running counts are ended and given back, so that the next process begins them at once. */
  async beforeApplicationShutdown(): Promise<void> {
    this.stopping.abort();
    await Promise.allSettled(this.running);
  }

  private async claimAndCount(jobId: string): Promise<void> {
    const job = await claimJob(this.em.fork(), jobId);
    if (job === null) return;
    const about = `job ${jobId}, load log ${job.subjectId}, attempt ${job.attempts}`;
    if (job.attempts > MAX_ATTEMPTS) {
      this.logger.error(`given up: ${about}`);
      await refuse(this.deps(), job, {
        code: 'interrupted',
        message:
          'Counting broke off three times for reasons of the service. Read the log again to try once more.',
      });
      return;
    }
    try {
      await countLoadLog(this.deps(), job, this.stopping.signal);
      this.logger.log(`ended: ${about}`);
    } catch (error) {
      await this.putBack(job, error, about);
    }
  }

  private async putBack(job: HeldJob, error: unknown, about: string): Promise<void> {
    if (error instanceof LeaseLostError) {
      this.logger.warn(`another worker took over, nothing was written: ${about}`);
      return;
    }
    const stopped = this.stopping.signal.aborted;
    const reason = error instanceof Error ? `${error.name}: ${error.message.split('\n')[0]}` : String(error);
    if (!stopped) this.logger.warn(`broke off: ${about}: ${reason}`);
    try {
      await returnJob(this.em.fork(), job, {
        pauseS: stopped ? 0 : RETRY_PAUSE_S * job.attempts,
        counts: !stopped,
        failure: stopped ? null : { code: 'broke-off', message: 'Counting broke off and is tried again.' },
      });
    } catch {
      // The database is away, or the lease was lost: the lease runs out, and the sweep finds the job.
      this.logger.warn(`could not be given back, its lease will run out: ${about}`);
    }
  }

  private deps() {
    return { em: this.em, pool: this.pool, clock: this.clock, storage: this.storage };
  }
}
