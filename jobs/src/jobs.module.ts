import { Inject, Injectable, Module, type OnApplicationShutdown } from '@nestjs/common';
import { ClockModule, ConfigModule, PersistenceModule } from '@stayledger/backend/persistence';
import { QueueModule } from '@stayledger/backend/queue/queue.module';
import { StorageModule } from '@stayledger/backend/storage/storage.module';
import { JobSweep } from './common/job-sweep.js';
import { CountLoadLogProcessor } from './load-logs/count-load-log.processor.js';
import { CountingPool } from './load-logs/counting-pool.js';
import { CountingRunner } from './load-logs/counting-runner.js';
import { PlanRerigProcessor } from './rerig-schedules/plan-rerig.processor.js';
import { PlanningRunner } from './rerig-schedules/planning-runner.js';
import { PlanningThreads } from './rerig-schedules/planning-threads.js';

/** One plan at a time: a plan is asked for now and then, and logs are counted beside it. */
const PLANNING_THREADS = 1;

/** Ends the planning threads with the process. */
@Injectable()
class PlanningEnd implements OnApplicationShutdown {
  constructor(@Inject(PlanningThreads) private readonly threads: PlanningThreads) {}

  async onApplicationShutdown(): Promise<void> {
    await this.threads.close();
  }
}

/** The background work, without HTTP: a process of its own, or beside the API in one. */
@Module({
  imports: [ConfigModule, ClockModule, PersistenceModule, QueueModule, StorageModule],
  providers: [
    CountLoadLogProcessor,
    CountingPool,
    CountingRunner,
    JobSweep,
    PlanRerigProcessor,
    PlanningRunner,
    PlanningEnd,
    { provide: PlanningThreads, useFactory: () => new PlanningThreads(PLANNING_THREADS) },
  ],
  exports: [JobSweep],
})
export class JobsModule {}
