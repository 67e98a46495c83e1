import { BullModule, InjectQueue } from '@nestjs/bull';
import { type BeforeApplicationShutdown, Injectable, Module } from '@nestjs/common';
import { LOAD_LOGS_JOB_OPTIONS, LOAD_LOGS_QUEUE } from '@stayledger/shared/queues/load-logs.queue';
import type { Queue } from 'bull';
import type { RedisOptions } from 'ioredis';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { newId } from '../common/ids/new-id.js';
import { JobQueue } from './job-queue.js';
import { QueueClients, type QueueClientType } from './queue-clients.js';

/** A count of a long log outlives the usual lock; a worker that was stopped three times is still no reason to give up. */
const SETTINGS = { lockDuration: 60_000, stalledInterval: 30_000, maxStalledCount: 3 };

/** Ends the queue before its connections, since Bull leaves connections alone that it did not make. */
@Injectable()
class QueueEnd implements BeforeApplicationShutdown {
  constructor(
    @InjectQueue(LOAD_LOGS_QUEUE) private readonly queue: Queue,
    private readonly clients: QueueClients,
  ) {}

  async beforeApplicationShutdown(): Promise<void> {
    await this.queue.close();
    this.clients.disconnect();
  }
}

@Module({
  providers: [
    { provide: QueueClients, inject: [ENV], useFactory: (env: Env) => new QueueClients(env.REDIS_URL) },
  ],
  exports: [QueueClients],
})
class QueueClientsModule {}

/**
 * The queue of the process. API and worker import this class, so that a process that is both has one queue. Without
 * REDIS_URL it lives in the memory of the process, under a prefix of its own: several applications of one process
 * (the tests) would otherwise take each other's work.
 */
@Module({
  imports: [
    QueueClientsModule,
    BullModule.registerQueueAsync({
      name: LOAD_LOGS_QUEUE,
      imports: [QueueClientsModule],
      inject: [QueueClients],
      useFactory: (clients: QueueClients) => ({
        prefix: clients.backEnd === 'redis' ? 'stayledger' : `embedded-${newId()}`,
        createClient: (type: QueueClientType, options?: RedisOptions) => clients.create(type, options),
        settings: SETTINGS,
        defaultJobOptions: { ...LOAD_LOGS_JOB_OPTIONS },
      }),
    }),
  ],
  providers: [JobQueue, QueueEnd],
  exports: [BullModule, JobQueue, QueueClientsModule],
})
export class QueueModule {}
