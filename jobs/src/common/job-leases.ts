import type { EntityManager } from '@mikro-orm/postgresql';
import { newId } from '@stayledger/backend/persistence';
import type { JobKind } from '@stayledger/shared/queues/load-logs.queue';

/** A job this process holds. Every write about it names the token, so that whoever lost the lease cannot write. */
export interface HeldJob {
  id: string;
  kind: string;
  subjectId: string;
  vesselId: string;
  inputVersion: number;
  attempts: number;
  token: string;
}

/** What went wrong, for people: a code to switch on and a sentence that says what mends it. */
export interface JobFailure {
  code: string;
  message: string;
}

/** Somebody else holds the job by now: whatever this process found out about it must not be written. */
export class LeaseLostError extends Error {
  override readonly name = 'LeaseLostError';
}

/** A worker that is gone is noticed after this time. */
export const LEASE_S = 30;
/** Faults of the machine are worth another try; so often a job is begun before it is given up. */
export const MAX_ATTEMPTS = 3;

/**
 * The rows of background work as a worker sees them. Times are the database's, which all workers share: their own
 * clocks may differ.
 */

/** Takes a job that nobody holds; null when it is done, held, or not to be tried yet. */
export async function claimJob(em: EntityManager, jobId: string): Promise<HeldJob | null> {
  const token = newId();
  const [row] = await em.execute<
    {
      kind: string;
      subject_id: string;
      vessel_id: string;
      input_version: number;
      attempts: number;
    }[]
  >(
    `update job set state = 'running', attempts = attempts + 1, lease_token = ?,
            lease_until = clock_timestamp() + make_interval(secs => ?),
            started_at = coalesce(started_at, clock_timestamp())
      where id = ? and state in ('queued', 'running') and (lease_until is null or lease_until < clock_timestamp())
      returning kind, subject_id, vessel_id, input_version, attempts`,
    [token, LEASE_S, jobId],
  );
  if (!row) return null;
  return {
    id: jobId,
    kind: row.kind,
    subjectId: row.subject_id,
    vesselId: row.vessel_id,
    inputVersion: row.input_version,
    attempts: row.attempts,
    token,
  };
}

/**
 * Holds on to a job for another while and notes its progress.
 *
 * @throws LeaseLostError
 */
export async function renewLease(em: EntityManager, job: HeldJob, progress: number): Promise<void> {
  await change(
    em,
    job,
    'lease_until = clock_timestamp() + make_interval(secs => ?), progress = greatest(progress, ?)',
    [LEASE_S, progress],
  );
}

/**
 * Ends a job for good. Called in the transaction that writes its result: either both are there or neither.
 *
 * @throws LeaseLostError which undoes that transaction
 */
export async function endJob(
  em: EntityManager,
  job: HeldJob,
  state: 'done' | 'failed' | 'cancelled',
  failure: JobFailure | null = null,
): Promise<void> {
  await change(
    em,
    job,
    `state = ?, last_error = ?::jsonb, lease_until = null, lease_token = null, finished_at = clock_timestamp(),
     progress = case when ? = 'done' then 1 else progress end`,
    [state, failure === null ? null : JSON.stringify(failure), state],
  );
}

/**
 * Puts a job back for another try after a pause.
 *
 * @param options.counts whether the try that ended counts; being stopped on purpose does not
 * @throws LeaseLostError
 */
export async function returnJob(
  em: EntityManager,
  job: HeldJob,
  options: { pauseS: number; counts: boolean; failure: JobFailure | null },
): Promise<void> {
  await change(
    em,
    job,
    `state = 'queued', last_error = ?::jsonb, lease_token = null, attempts = attempts - ?,
     lease_until = clock_timestamp() + make_interval(secs => ?)`,
    [
      options.failure === null ? null : JSON.stringify(options.failure),
      options.counts ? 0 : 1,
      options.pauseS,
    ],
  );
}

/**
 * Takes every lease back: for a process that knows it is the only one, at its start. What its predecessor held when it
 * was ended is then gone on with at once instead of when the lease runs out.
 */
export async function takeBackLeases(em: EntityManager): Promise<void> {
  await em.execute(`update job set lease_until = null, lease_token = null where state = 'running'`);
}

/** A job nobody was woken for yet, or not to any avail. */
export interface WaitingJob {
  id: string;
  kind: JobKind;
}

/** Jobs that wait and that nobody holds. */
export async function waitingJobs(em: EntityManager): Promise<WaitingJob[]> {
  return em.execute<WaitingJob[]>(
    `select id, kind from job
      where state in ('queued', 'running') and (lease_until is null or lease_until < clock_timestamp())
      order by created_at limit 200`,
  );
}

async function change(em: EntityManager, job: HeldJob, set: string, values: unknown[]): Promise<void> {
  const rows = await em.execute<unknown[]>(
    `update job set ${set} where id = ? and lease_token = ? and state = 'running' returning id`,
    [...values, job.id, job.token],
  );
  if (rows.length === 0) throw new LeaseLostError(`job ${job.id} is held by another worker`);
}
