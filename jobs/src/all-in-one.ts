import { stopOnSignals } from '@stayledger/backend/common/process/stop-on-signals';
import 'reflect-metadata';
import { EntityManager } from '@mikro-orm/postgresql';
import { Logger, Module } from '@nestjs/common';
import { createApp, LogIntake } from '@stayledger/backend/app';
import { AppModule } from '@stayledger/backend/app.module';
import { EnvironmentError, readEnv, type Env } from '@stayledger/backend/config/env';
import { readDemo } from '@stayledger/backend/database/seed/read-demo';
import { AnotherProcessError, becomeSoleProcess } from '@stayledger/backend/database/sole-process';
import { waitForDatabase } from '@stayledger/backend/database/wait-for-database';
import { takeBackLeases } from './common/job-leases.js';
import { bringInDemoLogs } from './demo/bring-in-demo-logs.js';
import { JobsModule } from './jobs.module.js';

/** API and worker in one process; they share its database pool and its queue. */
@Module({ imports: [AppModule, JobsModule] })
class AllInOneModule {}

const logger = new Logger('all-in-one');

async function main(): Promise<void> {
  const env = readEnv();
  const embedded = env.REDIS_URL === undefined;
  await waitForDatabase(env.DATABASE_APP_URL, () => logger.warn('the database is away; waiting for it'));
  const sole = embedded ? await becomeSoleProcess(env.DATABASE_APP_URL, giveUp) : null;
  const app = await createApp(env, AllInOneModule);
  if (embedded) await takeBackLeases(app.get(EntityManager).fork());
  const stopping = new AbortController();
  let demo: Promise<void> = Promise.resolve();
  stopOnSignals(async () => {
    stopping.abort();
    await demo;
    await app.close();
    await sole?.release();
  });
  await app.listen(env.PORT, env.HOST);
  logger.log(embedded ? 'the queue lives in this process' : 'the queue lives in Redis');
  // The starter waits for this line.
  process.stdout.write(`stayledger: ready on ${await app.getUrl()}\n`);
  demo = tellDemo(env, app.get(EntityManager), app.get(LogIntake), stopping.signal);
}

/** The demo's logs come in while the service is open already; what goes wrong with them keeps nobody from working. */
async function tellDemo(env: Env, em: EntityManager, intake: LogIntake, signal: AbortSignal): Promise<void> {
  try {
    const demo = await readDemo(env, em);
    if (demo === null) return;
    await bringInDemoLogs({ ...demo, intake, logger, signal });
  } catch (error) {
    if (!signal.aborted) logger.warn(`the demo's logs did not come in: ${String(error)}`);
  }
}

/** In embedded mode two processes would each wake only their own worker and could spoil each other's uploads. */
function giveUp(): void {
  logger.error('another process of the service took over this database; this one ends');
  process.kill(process.pid, 'SIGTERM');
}

main().catch((error: unknown) => {
  const known = error instanceof EnvironmentError || error instanceof AnotherProcessError;
  console.error(known ? error.message : error);
  process.exit(2);
});
