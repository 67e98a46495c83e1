import 'reflect-metadata';
import { Logger } from '@nestjs/common';
import { createApp } from './app.js';
import { EnvironmentError, readEnv } from './config/env.js';

/** How long requests under way may take to finish after we are told to stop. */
const DRAIN_MS = 10_000;

/** The API alone; the worker runs as processes of its own and needs REDIS_URL. */
async function main(): Promise<void> {
  const env = readEnv();
  const app = await createApp(env);
  await app.listen(env.PORT, env.HOST);
  const logger = new Logger('main');
  logger.log(`ready on ${await app.getUrl()}`);
  if (env.REDIS_URL === undefined) {
    logger.warn(
      'REDIS_URL is not set: load logs are taken in and wait, since no worker can be reached from here',
    );
  }

  let stopping = false;
  const stop = (): void => {
    // Ctrl-C arrives twice, from the terminal and from npm; the second is not a second wish.
    if (stopping) return;
    stopping = true;
    setTimeout(() => process.exit(0), DRAIN_MS).unref();
    app.close().then(
      () => process.exit(0),
      () => process.exit(1),
    );
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
}

main().catch((error: unknown) => {
  console.error(error instanceof EnvironmentError ? error.message : error);
  process.exit(2);
});
