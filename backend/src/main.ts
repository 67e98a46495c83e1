import { stopOnSignals } from './common/process/stop-on-signals.js';
import 'reflect-metadata';
import { Logger } from '@nestjs/common';
import { createApp } from './app.js';
import { EnvironmentError, readEnv } from './config/env.js';
import { waitForDatabase } from './database/wait-for-database.js';

/** The API alone; the worker runs as processes of its own and needs REDIS_URL. */
async function main(): Promise<void> {
  const env = readEnv();
  await waitForDatabase(env.DATABASE_APP_URL, () => console.error('The database is away; waiting for it.'));
  const app = await createApp(env);
  stopOnSignals(() => app.close());
  await app.listen(env.PORT, env.HOST);
  const logger = new Logger('main');
  logger.log(`ready on ${await app.getUrl()}`);
  if (env.REDIS_URL === undefined) {
    logger.warn(
      'REDIS_URL is not set: load logs are taken in and wait, since no worker can be reached from here',
    );
  }
}

main().catch((error: unknown) => {
  console.error(error instanceof EnvironmentError ? error.message : error);
  process.exit(2);
});
