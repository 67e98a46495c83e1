import type { EntityManager } from '@mikro-orm/postgresql';
import { type HeldJob, LeaseLostError, renewLease } from './job-leases.js';

const RENEW_EVERY_MS = 1000;

/**
 * Runs work while renewing the lease of its job each second; losing the lease, or being told to stop, ends the work.
 *
 * @param work gets the signal that ends it, and reports its progress as a share from 0 to 1
 * @throws LeaseLostError
 */
export async function whileHeld<T>(
  em: EntityManager,
  job: HeldJob,
  signal: AbortSignal,
  work: (options: { signal: AbortSignal; onProgress: (share: number) => void }) => Promise<T>,
): Promise<T> {
  const lost = new AbortController();
  let lostBecause: unknown = null;
  let progress = 0;
  let renewing = false;
  const timer = setInterval(() => {
    if (renewing) return;
    renewing = true;
    renewLease(em.fork(), job, progress)
      .catch((error: unknown) => {
        // A database that is away for a moment does not end the work; the lease is longer than the moment.
        if (!(error instanceof LeaseLostError)) return;
        lostBecause = error;
        lost.abort();
      })
      .finally(() => {
        renewing = false;
      });
  }, RENEW_EVERY_MS);
  try {
    return await work({
      signal: AbortSignal.any([signal, lost.signal]),
      onProgress: (share) => {
        progress = Math.min(1, share);
      },
    });
  } catch (error) {
    throw lostBecause ?? error;
  } finally {
    clearInterval(timer);
  }
}
