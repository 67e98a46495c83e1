import { stopOnSignals } from '@stayledger/backend/common/process/stop-on-signals';
import 'reflect-metadata';
import { Logger } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import { EnvironmentError, readEnv } from '@stayledger/backend/config/env';
import { waitForDatabase } from '@stayledger/backend/database/wait-for-database';
import { JobsModule } from './jobs.module.js';

/** The worker alone. It shares a Redis with the API: without one they could not wake each other. */
async function main(): Promise<void> {
  const env = readEnv();
  if (env.REDIS_URL === undefined) {
    throw new EnvironmentError(['REDIS_URL is not set; without a Redis run the all-in-one process instead']);
  }
  await waitForDatabase(env.DATABASE_APP_URL, () => console.error('The database is away; waiting for it.'));
  const worker = await NestFactory.createApplicationContext(JobsModule, { abortOnError: false });
  stopOnSignals(() => worker.close());
  new Logger('worker').log(`ready, counting in ${env.COUNTING_THREADS} thread(s)`);
}

main().catch((error: unknown) => {
  console.error(error instanceof EnvironmentError ? error.message : error);
  process.exit(2);
});
