import { z } from 'zod';

/** Queue and job names; both ends import these and know nothing else of each other. */
export const LOAD_LOGS_QUEUE = 'load-logs';
export const COUNT_LOAD_LOG = 'count-load-log';
export const PLAN_RERIG = 'plan-rerig';
/** Kinds of background work: kind of the job's row and name of the job in the queue alike. */
export type JobKind = typeof COUNT_LOAD_LOG | typeof PLAN_RERIG;

/** Payloads carry ids only: PostgreSQL holds the work, the queue only wakes a worker. */
export const jobPayloadSchema = z.object({ jobId: z.uuid() });
export type JobPayload = z.infer<typeof jobPayloadSchema>;

/** Kept jobs with the same id would make a later `add` a silent no-op, so none is kept. */
export const LOAD_LOGS_JOB_OPTIONS = { removeOnComplete: true, removeOnFail: true } as const;
