import { Injectable } from '@nestjs/common';
import { PassportSerializer } from '@nestjs/passport';
import { z } from 'zod';
import { Clock } from '../common/clock/clock.js';
import type { Principal } from './principal.js';
import { PrincipalsService } from './principals.service.js';

const storedSchema = z.object({ userId: z.uuid(), signedInAt: z.iso.datetime() });

/** What a session remembers: who, and since when. Roles are looked up at each request. */
@Injectable()
export class SessionSerializer extends PassportSerializer {
  constructor(
    private readonly principals: PrincipalsService,
    private readonly clock: Clock,
  ) {
    super();
  }

  serializeUser(user: Principal, done: (error: unknown, stored?: unknown) => void): void {
    done(null, { userId: user.userId, signedInAt: this.clock.now().toISOString() });
  }

  deserializeUser(stored: unknown, done: (error: unknown, user?: Principal | false) => void): void {
    const parsed = storedSchema.safeParse(stored);
    if (!parsed.success) return done(null, false);
    this.principals.ofSession(parsed.data.userId, parsed.data.signedInAt).then(
      (principal) => done(null, principal ?? false),
      (error: unknown) => done(error),
    );
  }
}
