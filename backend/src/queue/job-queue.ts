import { EventSubscriber, type Transaction, type TransactionEventArgs } from '@mikro-orm/core';
import { EntityManager } from '@mikro-orm/postgresql';
import { InjectQueue } from '@nestjs/bull';
import { Injectable, Logger } from '@nestjs/common';
import { type JobKind, type JobPayload, LOAD_LOGS_QUEUE } from '@stayledger/shared/queues/load-logs.queue';
import type { Queue } from 'bull';
import { Clock } from '../common/clock/clock.js';
import { newId } from '../common/ids/new-id.js';
import { Job } from '../jobs/job.entity.js';

/** Work to be done in the background, named by what it is about and which version of its input it works on. */
export interface NewJob {
  kind: JobKind;
  subjectId: string;
  vesselId: string;
  inputVersion: number;
}

/**
 * Hands work to the background. The row in PostgreSQL is the work; the queue only wakes a worker, after the commit,
 * and may fail to: the sweep of the worker finds every row that nobody works on.
 */
@Injectable()
export class JobQueue implements EventSubscriber {
  private readonly logger = new Logger(JobQueue.name);
  private readonly waiting = new WeakMap<object, { id: string; kind: JobKind }[]>();

  constructor(
    @InjectQueue(LOAD_LOGS_QUEUE) private readonly queue: Queue<JobPayload>,
    private readonly clock: Clock,
    em: EntityManager,
  ) {
    em.getEventManager().registerSubscriber(this);
  }

  /** Writes the job's row in the running transaction; a worker is woken once it is committed. */
  async announce(em: EntityManager, work: NewJob): Promise<Job> {
    const job = em.create(Job, {
      id: newId(),
      ...work,
      state: 'queued',
      attempts: 0,
      progress: 0,
      createdAt: this.clock.now(),
    });
    await em.persist(job).flush();
    const transaction = em.getTransactionContext<Transaction & object>();
    if (transaction === undefined) throw new Error('A job is announced within the transaction that needs it');
    this.waiting.set(transaction, [
      ...(this.waiting.get(transaction) ?? []),
      { id: job.id, kind: work.kind },
    ]);
    return job;
  }

  afterTransactionCommit({ transaction }: TransactionEventArgs): void {
    const jobs = transaction ? this.waiting.get(transaction as object) : undefined;
    for (const { id, kind } of jobs ?? []) void this.wake(id, kind);
  }

  /** Tells a worker that a row waits. Never fails: the sweep tells again. */
  async wake(jobId: string, kind: JobKind): Promise<void> {
    try {
      await this.queue.add(kind, { jobId }, { jobId });
    } catch (error) {
      const reason = error instanceof Error ? error.message : String(error);
      this.logger.warn(`the queue is not reachable, the sweep will find job ${jobId}: ${reason}`);
    }
  }
}
