import { Store, type SessionData } from 'express-session';
import type { Pool } from 'pg';
import type { Clock } from '../common/clock/clock.js';

/**
 * Sessions in PostgreSQL. A session lives until `idleLimitMs` after its last request, by the clock of the service; the
 * limit is kept here and not left to the cookie, which a thief would not throw away.
 */
export class SessionStore extends Store {
  constructor(
    private readonly pool: Pool,
    private readonly clock: Clock,
    private readonly idleLimitMs: number,
  ) {
    super();
  }

  get(sid: string, callback: (error: unknown, session?: SessionData | null) => void): void {
    this.pool
      .query<{ sess: SessionData }>(
        `select sess from session where sid = $1 and expire > $2::timestamptz at time zone 'UTC'`,
        [sid, this.clock.now()],
      )
      .then(
        ({ rows }) => callback(null, rows.at(0)?.sess ?? null),
        (error: unknown) => callback(error),
      );
  }

  set(sid: string, session: SessionData, callback?: (error?: unknown) => void): void {
    this.run(
      `insert into session (sid, sess, expire) values ($1, $2, $3::timestamptz at time zone 'UTC')
         on conflict (sid) do update set sess = excluded.sess, expire = excluded.expire`,
      [sid, JSON.stringify(session), this.end()],
      callback,
    );
  }

  /** Only prolongs: a session that was ended during this request stays ended. */
  override touch(sid: string, _session: SessionData, callback?: (error?: unknown) => void): void {
    this.run(
      `update session set expire = $2::timestamptz at time zone 'UTC' where sid = $1`,
      [sid, this.end()],
      callback,
    );
  }

  destroy(sid: string, callback?: (error?: unknown) => void): void {
    this.run('delete from session where sid = $1', [sid], callback);
  }

  private end(): Date {
    return new Date(this.clock.now().getTime() + this.idleLimitMs);
  }

  private run(sql: string, values: unknown[], callback?: (error?: unknown) => void): void {
    this.pool.query(sql, values).then(
      () => callback?.(),
      (error: unknown) => callback?.(error),
    );
  }
}
