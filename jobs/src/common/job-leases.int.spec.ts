import { setTimeout as pause } from 'node:timers/promises';
import { EntityManager } from '@mikro-orm/postgresql';
import { Clock } from '@stayledger/backend/persistence';
import { LOG_STORAGE, type LogStorage } from '@stayledger/backend/storage/log-storage';
import type { TestApp } from '@stayledger/backend/testing/test-app';
import { countLoadLog } from '../load-logs/count-load-log.js';
import { CountingRunner } from '../load-logs/counting-runner.js';
import { CountingPool } from '../load-logs/counting-pool.js';
import {
  createLoggedVessel,
  createTestService,
  type LoggedVessel,
  settled,
  swingingCsv,
  uploadLog,
} from '../testing/log-journey.js';
import {
  claimJob,
  endJob,
  type HeldJob,
  LeaseLostError,
  renewLease,
  returnJob,
  takeBackLeases,
  waitingJobs,
} from './job-leases.js';
import { JobSweep } from './job-sweep.js';

// Each test waits for real threads and a real database, on whatever else the machine is doing.
jest.setTimeout(60_000);

let app: TestApp;
let logged: LoggedVessel;

beforeAll(async () => {
  app = await createTestService();
  // The service's own sweep, every few seconds, would claim the very jobs these tests leave lying: they sweep themselves.
  await app.nest.get(JobSweep).beforeApplicationShutdown();
  logged = await createLoggedVessel(app);
});
afterAll(() => app?.close());

const never = new AbortController().signal;

function em(): EntityManager {
  return app.nest.get(EntityManager).fork();
}

function deps(pool: Pick<CountingPool, 'count'> = app.nest.get(CountingPool)) {
  return {
    em: em(),
    storage: app.nest.get<LogStorage>(LOG_STORAGE),
    pool,
    clock: app.nest.get(Clock),
  };
}

const idsOf = (jobs: readonly { id: string }[]): string[] => jobs.map(({ id }) => id);

/** A counted log whose job is put back as if a worker had died over it; nobody else touches it meanwhile. */
async function abandonedJob(start: string): Promise<{ jobId: string; loadLogId: string }> {
  const log = await uploadLog(logged, swingingCsv({ start, hours: 1, lowKn: 2, highKn: 9 }));
  await app.database.admin.query(
    `update load_log set state = 'counting', rows = null, from_at = null where id = $1`,
    [log.id],
  );
  await app.database.admin.query('delete from load_spectrum where vessel_id = $1', [logged.vessel.id]);
  await app.database.admin.query('delete from log_channel where load_log_id = $1', [log.id]);
  const { rows } = await app.database.admin.query(
    `update job set state = 'running', finished_at = null, lease_until = now() + interval '1 hour',
            lease_token = gen_random_uuid()
      where subject_id = $1 returning id`,
    [log.id],
  );
  return { jobId: rows[0].id, loadLogId: log.id };
}

async function expireLease(jobId: string): Promise<void> {
  await app.database.admin.query(`update job set lease_until = now() - interval '1 second' where id = $1`, [
    jobId,
  ]);
}

describe('leases', () => {
  it('are held by one worker at a time', async () => {
    const { jobId } = await abandonedJob('2026-06-01T06:00:00Z');
    expect(await claimJob(em(), jobId)).toBeNull();
    expect(idsOf(await waitingJobs(em()))).not.toContain(jobId);
    await expireLease(jobId);
    const claims = await Promise.all([claimJob(em(), jobId), claimJob(em(), jobId), claimJob(em(), jobId)]);
    const held = claims.filter((claim): claim is HeldJob => claim !== null);
    expect(held).toHaveLength(1);
    expect(held[0]).toMatchObject({ vesselId: logged.vessel.id, attempts: 2 });
    await endJob(em(), held[0], 'cancelled');
    expect(await claimJob(em(), jobId)).toBeNull();
  });

  it('refuse every write of a worker that lost one', async () => {
    const { jobId } = await abandonedJob('2026-06-02T06:00:00Z');
    await expireLease(jobId);
    const orphan = await claimJob(em(), jobId);
    await expireLease(jobId);
    const heir = await claimJob(em(), jobId);
    if (orphan === null || heir === null) throw new Error('both claims were to succeed');
    await expect(renewLease(em(), orphan, 0.5)).rejects.toThrow(LeaseLostError);
    await expect(endJob(em(), orphan, 'done')).rejects.toThrow(LeaseLostError);
    await expect(returnJob(em(), orphan, { pauseS: 0, counts: true, failure: null })).rejects.toThrow(
      LeaseLostError,
    );
    await renewLease(em(), heir, 0.5);
    await endJob(em(), heir, 'cancelled');
  });

  it('undo the whole result of an orphan that finishes after all', async () => {
    const { jobId, loadLogId } = await abandonedJob('2026-06-03T06:00:00Z');
    await expireLease(jobId);
    const orphan = await claimJob(em(), jobId);
    if (orphan === null) throw new Error('the claim was to succeed');
    const pool = app.nest.get(CountingPool);
    const slow: Pick<CountingPool, 'count'> = {
      async count(path, config, options) {
        const outcome = await pool.count(path, config, options);
        // While it counted, its lease ran out and another worker took the job.
        await expireLease(jobId);
        await claimJob(em(), jobId);
        return outcome;
      },
    };
    await expect(countLoadLog(deps(slow), orphan, never)).rejects.toThrow(LeaseLostError);
    const { rows } = await app.database.admin.query(
      `select state, (select count(*)::int from log_channel c where c.load_log_id = l.id) as channels
         from load_log l where id = $1`,
      [loadLogId],
    );
    expect(rows[0]).toEqual({ state: 'counting', channels: 0 });
  });

  it('end a count whose lease was lost while it runs', async () => {
    const { jobId } = await abandonedJob('2026-06-04T06:00:00Z');
    await expireLease(jobId);
    const orphan = await claimJob(em(), jobId);
    if (orphan === null) throw new Error('the claim was to succeed');
    const endless: Pick<CountingPool, 'count'> = {
      count: (_path, _config, { signal }) =>
        new Promise((_resolve, reject) => {
          signal.addEventListener('abort', () => reject(new Error('thread ended')));
        }),
    };
    const counting = countLoadLog(deps(endless), orphan, never);
    await expireLease(jobId);
    await claimJob(em(), jobId);
    await expect(counting).rejects.toThrow(LeaseLostError);
  });

  it('make counting twice the same as counting once', async () => {
    const log = await uploadLog(
      logged,
      swingingCsv({ start: '2026-06-05T06:00:00Z', hours: 1, lowKn: 2, highKn: 9 }),
    );
    const result = () =>
      app.database.admin.query(
        `select c.id, s.sha256, c.samples from log_channel c join load_spectrum s on s.log_channel_id = c.id
          where c.load_log_id = $1`,
        [log.id],
      );
    const once = (await result()).rows;
    await app.database.admin.query(`update load_log set state = 'counting' where id = $1`, [log.id]);
    await app.database.admin.query(`update job set state = 'queued' where subject_id = $1`, [log.id]);
    const again = await claimJob(em(), log.job?.id ?? '');
    if (again) await countLoadLog(deps(), again, never);
    await settled(logged.agent, log.id);
    expect((await result()).rows).toEqual(once);
  });
});

describe('a process that is the only one', () => {
  it('goes on at once with what its predecessor held', async () => {
    const { jobId, loadLogId } = await abandonedJob('2026-06-10T06:00:00Z');
    expect(idsOf(await waitingJobs(em()))).not.toContain(jobId);
    await takeBackLeases(em());
    await app.nest.get(JobSweep).sweep();
    expect((await settled(logged.agent, loadLogId)).state).toBe('counted');
  });
});

describe('a worker that is told to stop', () => {
  it('gives its job back at once, and the try does not count', async () => {
    const { jobId, loadLogId } = await abandonedJob('2026-06-09T06:00:00Z');
    await expireLease(jobId);
    let begun: () => void = () => undefined;
    const counting = new Promise<void>((resolve) => {
      begun = resolve;
    });
    const endless: Pick<CountingPool, 'count'> = {
      count: (_path, _config, { signal }) =>
        new Promise((_resolve, reject) => {
          begun();
          signal.addEventListener('abort', () => reject(new Error('thread ended')));
        }),
    };
    const { em: manager, clock, storage } = deps();
    const runner = new CountingRunner(manager, endless, clock, storage);
    const run = runner.run(jobId);
    await counting;
    await runner.beforeApplicationShutdown();
    await run;
    const { rows } = await app.database.admin.query(
      'select state, attempts, last_error from job where id = $1',
      [jobId],
    );
    expect(rows[0]).toEqual({ state: 'queued', attempts: 1, last_error: null });
    await app.nest.get(JobSweep).sweep();
    expect((await settled(logged.agent, loadLogId)).state).toBe('counted');
  });
});

describe('the sweep', () => {
  it('finds a job nobody was woken for', async () => {
    const { jobId, loadLogId } = await abandonedJob('2026-06-06T06:00:00Z');
    await expireLease(jobId);
    await app.nest.get(JobSweep).sweep();
    expect(await settled(logged.agent, loadLogId)).toMatchObject({
      state: 'counted',
      job: { state: 'done' },
    });
  });

  it('leaves a job alone that is to be tried later', async () => {
    const { jobId } = await abandonedJob('2026-06-07T06:00:00Z');
    await expireLease(jobId);
    const held = await claimJob(em(), jobId);
    if (held === null) throw new Error('the claim was to succeed');
    await returnJob(em(), held, {
      pauseS: 1,
      counts: true,
      failure: { code: 'broke-off', message: 'Later.' },
    });
    expect(idsOf(await waitingJobs(em()))).not.toContain(jobId);
    await pause(1100);
    expect(idsOf(await waitingJobs(em()))).toContain(jobId);
    await endJob(em(), (await claimJob(em(), jobId)) ?? held, 'cancelled');
  });

  it('gives a job up after three tries, in words', async () => {
    const { jobId, loadLogId } = await abandonedJob('2026-06-08T06:00:00Z');
    await app.database.admin.query('update job set attempts = 3 where id = $1', [jobId]);
    await expireLease(jobId);
    await app.nest.get(JobSweep).sweep();
    const log = await settled(logged.agent, loadLogId);
    expect(log).toMatchObject({
      state: 'failed',
      failure: { code: 'interrupted' },
      job: { state: 'failed' },
    });
    expect(log.failure?.message).toContain('Read the log again');
  });
});
