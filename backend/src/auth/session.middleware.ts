import { Inject, Injectable, type OnApplicationShutdown } from '@nestjs/common';
import type { RequestHandler } from 'express';
import session from 'express-session';
import passport from 'passport';
import { Pool } from 'pg';
import { Clock } from '../common/clock/clock.js';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { SessionStore } from './session-store.js';

/** Signed out after this long without a request. */
const IDLE_LIMIT_MS = 8 * 3_600_000;

/** Sessions in PostgreSQL, on a small pool of their own: the store speaks to pg directly, as the application role. */
@Injectable()
export class SessionMiddleware implements OnApplicationShutdown {
  readonly cookieName: string;
  readonly pool: Pool;
  readonly handlers: RequestHandler[];

  constructor(@Inject(ENV) env: Env, clock: Clock) {
    const tls = env.PUBLIC_URL?.startsWith('https:') ?? false;
    // The prefix promises "only over TLS, only this host". Plain loopback cannot keep it; there the port keeps two
    // services apart, since cookies ignore ports.
    this.cookieName = tls ? '__Host-sid' : `sid-${env.PORT}`;
    this.pool = new Pool({
      connectionString: env.DATABASE_APP_URL,
      max: 4,
      connectionTimeoutMillis: 5_000,
      options: '-c TimeZone=UTC',
      application_name: 'stayledger sessions',
    });
    // Without a listener, a connection that PostgreSQL ends while idle would end the process.
    this.pool.on('error', () => undefined);
    this.handlers = [
      session({
        name: this.cookieName,
        secret: env.SESSION_SECRET,
        store: new SessionStore(this.pool, clock, IDLE_LIMIT_MS),
        resave: false,
        saveUninitialized: false,
        rolling: true,
        cookie: { httpOnly: true, sameSite: 'lax', path: '/', secure: tls || 'auto', maxAge: IDLE_LIMIT_MS },
      }),
      passport.initialize(),
      passport.session(),
    ];
  }

  async onApplicationShutdown(): Promise<void> {
    await this.pool.end();
  }
}
