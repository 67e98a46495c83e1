import { EntityManager } from '@mikro-orm/postgresql';
import { Inject, Injectable } from '@nestjs/common';
import { Clock } from '@stayledger/backend/persistence';
import { LOG_STORAGE, type LogStorage } from '@stayledger/backend/storage/log-storage';
import { COUNT_LOAD_LOG } from '@stayledger/shared/queues/load-logs.queue';
import type { HeldJob } from '../common/job-leases.js';
import { JobRunner } from '../common/job-runner.js';
import { countLoadLog, refuse } from './count-load-log.js';
import { CountingPool } from './counting-pool.js';

/** Works off the counting of load logs. */
@Injectable()
export class CountingRunner extends JobRunner {
  constructor(
    em: EntityManager,
    @Inject(CountingPool) private readonly pool: Pick<CountingPool, 'count'>,
    private readonly clock: Clock,
    @Inject(LOG_STORAGE) private readonly storage: LogStorage,
  ) {
    super(em, COUNT_LOAD_LOG, 'load log', 'Counting broke off and is tried again.');
  }

  protected override work(job: HeldJob, signal: AbortSignal): Promise<void> {
    return countLoadLog(this.deps(), job, signal);
  }

  protected override giveUp(job: HeldJob): Promise<void> {
    return refuse(this.deps(), job, {
      code: 'interrupted',
      message:
        'Counting broke off three times for reasons of the service. Read the log again to try once more.',
    });
  }

  private deps() {
    return { em: this.em, pool: this.pool, clock: this.clock, storage: this.storage };
  }
}
