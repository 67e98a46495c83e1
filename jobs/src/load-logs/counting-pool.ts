import { join } from 'node:path';
import { MessageChannel } from 'node:worker_threads';
import { Inject, Injectable, type OnApplicationShutdown } from '@nestjs/common';
import type { Env } from '@stayledger/backend/config/env';
import { ENV } from '@stayledger/backend/persistence';
import type { LoadLogConfig } from '@stayledger/shared/fatigue/load-history/load-log';
import Piscina from 'piscina';
import type { CountOutcome } from './count-outcome.js';
import type { CountTask } from './count-load-log.worker.js';

/** Threads are plain Node and read what was built, also when the rest runs from its sources (the tests). */
const WORKER_FILE = join(__dirname, '../../dist/load-logs/count-load-log.worker.js');
const IDLE_MS = 30_000;

/** The threads logs are counted in; the event loop of the process stays free for people. */
@Injectable()
export class CountingPool implements OnApplicationShutdown {
  private readonly pool: Piscina<CountTask, CountOutcome>;

  constructor(@Inject(ENV) env: Env) {
    this.pool = new Piscina({
      filename: WORKER_FILE,
      minThreads: 0,
      maxThreads: env.COUNTING_THREADS,
      idleTimeout: IDLE_MS,
    });
  }

  /**
   * Counts one file in a thread.
   *
   * @param options.signal ends the thread at once
   * @param options.onProgress receives the bytes read so far, once a second at most
   */
  async count(
    path: string,
    config: LoadLogConfig,
    options: { signal: AbortSignal; onProgress: (bytesRead: number) => void },
  ): Promise<CountOutcome> {
    const { port1, port2 } = new MessageChannel();
    port1.on('message', options.onProgress);
    try {
      return await this.pool.run(
        { path, config, port: port2 },
        { transferList: [port2], signal: options.signal },
      );
    } finally {
      port1.close();
    }
  }

  async onApplicationShutdown(): Promise<void> {
    await this.pool.destroy();
  }
}
