import { Module } from '@nestjs/common';
import { ClockModule, ConfigModule, PersistenceModule } from '@stayledger/backend/persistence';
import { QueueModule } from '@stayledger/backend/queue/queue.module';
import { StorageModule } from '@stayledger/backend/storage/storage.module';
import { JobSweep } from './common/job-sweep.js';
import { CountLoadLogProcessor } from './load-logs/count-load-log.processor.js';
import { CountingPool } from './load-logs/counting-pool.js';
import { CountingRunner } from './load-logs/counting-runner.js';

/** The background work, without HTTP: a process of its own, or beside the API in one. */
@Module({
  imports: [ConfigModule, ClockModule, PersistenceModule, QueueModule, StorageModule],
  providers: [CountLoadLogProcessor, CountingPool, CountingRunner, JobSweep],
  exports: [JobSweep],
})
export class JobsModule {}
