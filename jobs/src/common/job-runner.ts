import type { EntityManager } from '@mikro-orm/postgresql';
import { Logger, type BeforeApplicationShutdown } from '@nestjs/common';
import { claimJob, type HeldJob, LeaseLostError, MAX_ATTEMPTS, returnJob } from './job-leases.js';

const RETRY_PAUSE_S = 5;

/** Works off single jobs of one kind: claims, works, and decides what becomes of a job that did not succeed. */
export abstract class JobRunner implements BeforeApplicationShutdown {
  private readonly stopping = new AbortController();
  private readonly running = new Set<Promise<void>>();
  private readonly logger: Logger;

  /**
   * @param kind of the jobs, for the log
   * @param subject what a job is about, for the log
   * @param brokeOff sentence for people while the job waits for its next try
   */
  protected constructor(
    protected readonly em: EntityManager,
    kind: string,
    private readonly subject: string,
    private readonly brokeOff: string,
  ) {
    this.logger = new Logger(kind);
  }

  /** Does the work and ends the job in the transaction that writes the result. */
  protected abstract work(job: HeldJob, signal: AbortSignal): Promise<void>;

  /** Ends a job that broke off so often that it is given up. */
  protected abstract giveUp(job: HeldJob): Promise<void>;

  /** Does nothing when the job is done or another worker holds it. Never throws for what happens to the job. */
  async run(jobId: string): Promise<void> {
    if (this.stopping.signal.aborted) return;
    const work = this.claimAndWork(jobId);
    this.running.add(work);
    try {
      await work;
    } finally {
      this.running.delete(work);
    }
  }

  /** Running work is ended and given back, so that the next process begins it at once. */
  async beforeApplicationShutdown(): Promise<void> {
    this.stopping.abort();
    await Promise.allSettled(this.running);
  }

  private async claimAndWork(jobId: string): Promise<void> {
    const job = await claimJob(this.em.fork(), jobId);
    if (job === null) return;
    const about = `job ${jobId}, ${this.subject} ${job.subjectId}, attempt ${job.attempts}`;
    if (job.attempts > MAX_ATTEMPTS) {
      this.logger.error(`given up: ${about}`);
      await this.giveUp(job);
      return;
    }
    try {
      await this.work(job, this.stopping.signal);
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
        failure: stopped ? null : { code: 'broke-off', message: this.brokeOff },
      });
    } catch {
      // The database is away, or the lease was lost: the lease runs out, and the sweep finds the job.
      this.logger.warn(`could not be given back, its lease will run out: ${about}`);
    }
  }
}
