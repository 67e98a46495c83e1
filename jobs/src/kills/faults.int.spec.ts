import { createHash } from 'node:crypto';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { EntityManager, MikroORM } from '@mikro-orm/postgresql';
import { ormOptions } from '@stayledger/backend/database/mikro-orm.config';
import { seedReferenceData } from '@stayledger/backend/database/seed/reference-data';
import { Clock } from '@stayledger/backend/persistence';
import { LOG_STORAGE, type LogStorage } from '@stayledger/backend/storage/log-storage';
import { type FaultMoment, StepFaults } from '@stayledger/backend/testing/step-faults';
import { TestApp } from '@stayledger/backend/testing/test-app';
import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import { CountingPool } from '../load-logs/counting-pool.js';
import { CountingRunner } from '../load-logs/counting-runner.js';
import { accountsOf } from '../testing/kills/accounts.js';
import {
  announceLog,
  createLoggedVessel,
  type LoggedVessel,
  sendBytes,
  sendPiece,
  swingingCsv,
} from '../testing/log-journey.js';
import { tellFigures } from '../testing/kills/soak.js';

jest.setTimeout(240_000);

const CSV = Buffer.from(swingingCsv({ start: '2026-06-01T06:00:00Z', hours: 2, lowKn: 3, highKn: 12 }));
const SHA256 = createHash('sha256').update(CSV).digest('hex');
const MOMENTS: FaultMoment[] = ['before', 'after'];
/** More steps than any deed takes: a deed that never ends without a fault would otherwise go on for ever. */
const STEPS_MAX = 400;

let app: TestApp;
let faults: StepFaults;
let logged: LoggedVessel;
let pool: CountingPool;

/** How many steps each deed had, for the soak's report. */
const stepsOf: Record<string, number> = {};

/** No worker runs beside: every call that is counted belongs to the deed under test. */
beforeAll(async () => {
  // The query builder tells of each lost connection on the console.
  jest.spyOn(console, 'log').mockImplementation(() => undefined);
  app = await TestApp.create({ env: { COUNTING_THREADS: '1' } });
  const orm = await MikroORM.init(ormOptions(app.database.ownerUrl));
  try {
    await seedReferenceData(orm.em.fork(), app.clock.now());
  } finally {
    await orm.close(true);
  }
  logged = await createLoggedVessel(app);
  pool = new CountingPool(app.env);
  faults = new StepFaults(app.env.STAYLEDGER_DATA);
});
afterAll(async () => {
  faults?.end();
  await pool?.onApplicationShutdown();
  await app?.close();
  tellFigures('faults', { steps: stepsOf });
});

async function one<T>(query: string, values: unknown[]): Promise<T> {
  const { rows } = await app.database.admin.query(query, values);
  return rows[0] as T;
}

/**
 * Does a deed again and again, with its first step failing, its second, and so on, until it has no more steps to fail;
 * returns how many it had.
 */
async function failAtEachStep(
  name: string,
  moment: FaultMoment,
  deed: () => Promise<unknown>,
  check: (failed: string) => Promise<void>,
): Promise<number> {
  for (let at = 1; at <= STEPS_MAX; at++) {
    faults.arm(at, moment);
    await deed();
    const failed = faults.disarm();
    if (failed === null) {
      stepsOf[`${name}, ${moment}`] = at - 1;
      return at - 1;
    }
    await check(`step ${at}, ${moment}: ${failed}`);
  }
  throw new Error(`still failing after ${STEPS_MAX} steps`);
}

/** A cut connection says to come back; a broken device is an accident. Neither may be silent about it. */
function expectHonest(reply: { status: number; headers: Record<string, string> }, failed: string): void {
  const file = failed.endsWith('of a file');
  if (reply.status >= 400) expect([failed, reply.status]).toEqual([failed, file ? 500 : 503]);
  if (reply.status === 503) expect(Number(reply.headers['retry-after'])).toBeGreaterThan(0);
}

describe.each(MOMENTS)('a fault %s any step', (moment) => {
  it('of an announcement leaves one log or none, and the same wish makes it one', async () => {
    let key = '';
    let reply = { status: 0, headers: {} as Record<string, string> };
    let n = 0;
    const name = () => `announced-${moment}-${n}.csv`;
    const announce = () =>
      logged.agent
        .post(`/api/vessels/${logged.vessel.id}/load-logs`)
        .set('Idempotency-Key', key)
        .send({
          fileName: name(),
          sizeBytes: CSV.length,
          mapping: {
            time: { column: 'time', format: 'iso' },
            channels: [{ column: 'cap_port_kN', unit: 'kN', positionId: logged.position.id }],
          },
        });
    const announced = () =>
      one<{ logs: number; events: number }>(
        `select count(distinct l.id)::int as logs, count(a.id)::int as events
           from load_log l left join audit_event a on a.subject_id = l.id::text and a.action = 'load-log.announced'
          where l.file_name = $1`,
        [name()],
      );
    const steps = await failAtEachStep(
      'announcement',
      moment,
      async () => {
        n += 1;
        key = crypto.randomUUID();
        reply = await announce();
      },
      async (failed) => {
        expectHonest(reply, failed);
        const { logs, events } = await announced();
        expect([failed, [0, 1].includes(logs), events]).toEqual([failed, true, logs]);
        expect([failed, (await announce()).status]).toEqual([failed, 201]);
        expect([failed, await announced()]).toEqual([failed, { logs: 1, events: 1 }]);
      },
    );
    expect(steps).toBeGreaterThan(8);
  });

  it('of an upload leaves the log waiting for bytes or received, and it can be gone on with', async () => {
    let log: LoadLogDto;
    let reply = { status: 0, headers: {} as Record<string, string> };
    const fileOf = (id: string) => join(app.env.STAYLEDGER_DATA, 'files', logged.vessel.id, id);
    const stateOf = (id: string) =>
      one<{ state: string; jobs: number; events: number; sha256: string | null }>(
        `select state, sha256, (select count(*)::int from job where subject_id = l.id) as jobs,
                (select count(*)::int from audit_event where subject_id = l.id::text and action = 'load-log.received') as events
           from load_log l where id = $1`,
        [id],
      );
    const received = { state: 'received', jobs: 1, events: 1, sha256: SHA256 };
    log = await announceLog(logged, CSV.length);
    const steps = await failAtEachStep(
      'upload',
      moment,
      async () => {
        const metadata = `loadLogId ${Buffer.from(log.id).toString('base64')}`;
        reply = await logged.agent.post('/api/uploads').set({
          'Tus-Resumable': '1.0.0',
          'Upload-Length': String(CSV.length),
          'Upload-Metadata': metadata,
        });
        if (reply.status === 201) reply = await sendPiece(logged.agent, log.id, 0, CSV);
      },
      async (failed) => {
        expectHonest(reply, failed);
        const found = await stateOf(log.id);
        if (found.state === 'receiving') {
          expect([failed, found]).toEqual([failed, { state: 'receiving', jobs: 0, events: 0, sha256: null }]);
          // As a client goes on: it asks where to, and begins anew where nothing is known of the upload.
          const head = await logged.agent.head(`/api/uploads/${log.id}`).set('Tus-Resumable', '1.0.0');
          if (head.status === 404) await sendBytes(logged.agent, log, CSV);
          else {
            expect([failed, head.status]).toEqual([failed, 200]);
            const offset = Number(head.headers['upload-offset']);
            if (offset < CSV.length) {
              await sendPiece(logged.agent, log.id, offset, CSV.subarray(offset)).expect(204);
            }
          }
        }
        expect([failed, await stateOf(log.id)]).toEqual([failed, received]);
        expect(existsSync(`${fileOf(log.id)}.part`)).toBe(false);
        expect(
          createHash('sha256')
            .update(readFileSync(fileOf(log.id)))
            .digest('hex'),
        ).toBe(SHA256);
        log = await announceLog(logged, CSV.length);
      },
    );
    expect(steps).toBeGreaterThan(20);
    expect(await stateOf(log.id)).toEqual(received);
  });

  it('of a count leaves nothing of it or all, and the next try makes it whole', async () => {
    const log = await announceLog(logged, CSV.length);
    await sendBytes(logged.agent, log, CSV);
    const { id: jobId } = await one<{ id: string }>('select id from job where subject_id = $1', [log.id]);
    const runner = new CountingRunner(
      app.nest.get(EntityManager),
      pool,
      app.nest.get(Clock),
      app.nest.get<LogStorage>(LOG_STORAGE),
    );
    const found = () =>
      one<{ state: string; job: string; channels: number; spectra: number; events: number }>(
        `select l.state, j.state as job,
                (select count(*)::int from log_channel where load_log_id = l.id) as channels,
                (select count(*)::int from load_spectrum s join log_channel c on c.id = s.log_channel_id
                  where c.load_log_id = l.id) as spectra,
                (select count(*)::int from audit_event where subject_id = l.id::text and action = 'load-log.counted') as events
           from load_log l join job j on j.subject_id = l.id where l.id = $1`,
        [log.id],
      );
    const whole = { state: 'counted', job: 'done', channels: 1, spectra: 1, events: 1 };
    /** As time does: what was held or paused is held no longer; and the tries made here are not counted. */
    const letGo = () =>
      app.database.admin.query(
        `update job set lease_until = null, attempts = 0 where id = $1 and state in ('queued', 'running')`,
        [jobId],
      );
    const asReceived = async () => {
      const { admin } = app.database;
      await admin.query(
        'delete from load_spectrum where log_channel_id in (select id from log_channel where load_log_id = $1)',
        [log.id],
      );
      await admin.query('delete from log_channel where load_log_id = $1', [log.id]);
      await admin.query(`update load_log set state = 'received' where id = $1`, [log.id]);
      await admin.query(`update job set state = 'queued', attempts = 0, lease_until = null where id = $1`, [
        jobId,
      ]);
      await admin.query('alter table audit_event disable trigger user');
      await admin.query(`delete from audit_event where subject_id = $1 and action = 'load-log.counted'`, [
        log.id,
      ]);
      await admin.query('alter table audit_event enable trigger user');
    };
    const steps = await failAtEachStep(
      'count',
      moment,
      () => runner.run(jobId).catch(() => undefined),
      async (failed) => {
        const after = await found();
        if (after.state !== 'counted') {
          expect([failed, ['received', 'counting'].includes(after.state), after]).toEqual([
            failed,
            true,
            { state: after.state, job: after.job, channels: 0, spectra: 0, events: 0 },
          ]);
          expect(['queued', 'running']).toContain(after.job);
          await letGo();
          await runner.run(jobId);
        }
        expect([failed, await found()]).toEqual([failed, whole]);
        await asReceived();
      },
    );
    expect(steps).toBeGreaterThan(12);
    expect(await found()).toEqual(whole);
  });

  it('of a posting leaves the account as it was or whole, and it can be posted once', async () => {
    /** A vessel of its own with a counted log. */
    const counted = async (): Promise<{ on: LoggedVessel; log: LoadLogDto }> => {
      const on = await createLoggedVessel(app);
      const { id } = await announceLog(on, CSV.length);
      await sendBytes(on.agent, { id } as LoadLogDto, CSV);
      const { id: jobId } = await one<{ id: string }>('select id from job where subject_id = $1', [id]);
      const { nest } = app;
      await new CountingRunner(nest.get(EntityManager), pool, nest.get(Clock), nest.get(LOG_STORAGE)).run(
        jobId,
      );
      return { on, log: (await on.agent.get(`/api/load-logs/${id}`).expect(200)).body as LoadLogDto };
    };
    const post = ({ on, log }: { on: LoggedVessel; log: LoadLogDto }) =>
      on.agent.post(`/api/load-logs/${log.id}/post`).send({ version: log.version });
    const stateOf = ({ on, log }: { on: LoggedVessel; log: LoadLogDto }) =>
      one<{ state: string; entries: number; events: number }>(
        `select state, (select count(*)::int from ledger_entry where vessel_id = $2) as entries,
                (select count(*)::int from audit_event where subject_id = l.id::text and action = 'load-log.posted') as events
           from load_log l where id = $1`,
        [log.id, on.vessel.id],
      );
    const peaceful = await counted();
    await post(peaceful).expect(200);
    const expected = await accountsOf(app.database.admin, peaceful.on.vessel.id);
    const { entries } = await stateOf(peaceful);
    expect(entries).toBeGreaterThan(2);

    let mine = await counted();
    let reply = { status: 0, headers: {} as Record<string, string> };
    const whole = { state: 'posted', entries, events: 1 };
    const steps = await failAtEachStep(
      'posting',
      moment,
      async () => {
        reply = await post(mine);
      },
      async (failed) => {
        expectHonest(reply, failed);
        const after = await stateOf(mine);
        if (after.state === 'counted') {
          expect([failed, after]).toEqual([failed, { state: 'counted', entries: 0, events: 0 }]);
          return;
        }
        expect([failed, after]).toEqual([failed, whole]);
        expect(await accountsOf(app.database.admin, mine.on.vessel.id)).toEqual(expected);
        expect([failed, (await post(mine)).status]).toEqual([failed, 409]);
        mine = await counted();
      },
    );
    expect(steps).toBeGreaterThan(20);
    expect(await stateOf(mine)).toEqual(whole);
    expect(await accountsOf(app.database.admin, mine.on.vessel.id)).toEqual(expected);
  });
});
