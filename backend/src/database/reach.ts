import type { EntityManager } from '@mikro-orm/postgresql';
import { UnavailableError } from '../common/errors/app-error.js';

/** Whose eyes the database looks through: row level security shows the vessels of these parties and no others. */
export interface Reach {
  /** `user:<id>`, `firm:<id>`, or `vessel:<id>` for the service itself at work on one vessel. */
  parties: readonly string[];
  userId?: string;
}

/**
 * Runs `work` in one transaction that sees what `reach` allows. The setting ends with the transaction, so a pooled
 * connection carries nothing over to the next one. Nothing reaches vessel data except through here.
 */
export async function inReach<T>(
  em: EntityManager,
  reach: Reach,
  work: (em: EntityManager) => Promise<T>,
): Promise<T> {
  return em.transactional(async (inner) => {
    await begin(inner, reach);
    return work(inner);
  });
}

/** The first statement of every transaction. */
async function begin(em: EntityManager, reach: Reach): Promise<void> {
  try {
    await em.execute(`select set_config('app.parties', ?, true), set_config('app.user_id', ?, true)`, [
      reach.parties.join(','),
      reach.userId ?? '',
    ]);
  } catch (error) {
    // A connection that is cut while the transaction begins is told of here and in these words only.
    if (error instanceof Error && error.message.includes('Transaction query already complete')) {
      throw new UnavailableError({ cause: error });
    }
    throw error;
  }
}

/**
 * Runs `work` as the service itself, at work on one vessel: for jobs and for the first rows of a new vessel.
 * `em` is forked first, since jobs and timers have no request to give them a context.
 */
export async function withAccess<T>(
  em: EntityManager,
  scope: { vesselId: string; userId?: string },
  work: (em: EntityManager) => Promise<T>,
): Promise<T> {
  return inReach(em.fork(), { parties: [`vessel:${scope.vesselId}`], userId: scope.userId }, work);
}

/** Adds a vessel to the reach of the running transaction, so that its first access row may be written. */
export async function widenReach(em: EntityManager, vesselId: string): Promise<void> {
  await em.execute(
    `select set_config('app.parties', concat_ws(',', nullif(current_setting('app.parties', true), ''), ?::text), true)`,
    [`vessel:${vesselId}`],
  );
}
