import { createHash } from 'node:crypto';
import { EntityManager } from '@mikro-orm/postgresql';
import { Inject, Injectable } from '@nestjs/common';
import { Clock } from '../common/clock/clock.js';
import { TooManyAttemptsError, WrongCredentialsError } from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { ServiceSetting } from '../database/service-setting.entity.js';
import { User } from '../users/user.entity.js';
import { DEMO_SETTING, demoIsOpen, type DemoSetting } from './demo.js';
import { passwordMatches } from './passwords.js';
import type { Principal } from './principal.js';
import { PrincipalsService } from './principals.service.js';
import { SignInAttempt } from './sign-in-attempt.entity.js';

const ATTEMPTS_MAX = 10;
const WINDOW_MS = 15 * 60_000;

/** Tells whether an address and a password belong together, slowly enough to make guessing useless. */
@Injectable()
export class SignInService {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
    private readonly principals: PrincipalsService,
    @Inject(ENV) private readonly env: Env,
  ) {}

  async signIn(email: string, password: string, address: string): Promise<Principal> {
    const em = this.em.fork();
    const attempt = await this.beginAttempt(em, email, address);
    const user = await em.findOne(User, { email });
    const matches = await passwordMatches(password, user?.passwordHash);
    if (!user || !matches || !user.active || !(await this.mayOpen(em, user)))
      throw new WrongCredentialsError();
    await em.nativeUpdate(SignInAttempt, { id: attempt }, { succeeded: true });
    return this.principals.ofUser(user);
  }

  /** Counts itself before the password is looked at, so that a hundred guesses at once count as a hundred. */
  private async beginAttempt(em: EntityManager, email: string, address: string): Promise<string> {
    const now = this.clock.now();
    const accountKey = createHash('sha256').update(email).digest('hex');
    const id = newId();
    await em.insert(SignInAttempt, { id, accountKey, address, succeeded: false, attemptedAt: now });
    const failures: { attempted_at: string }[] = await em.execute(
      `select attempted_at from sign_in_attempt a
        where account_key = ? and not succeeded and attempted_at > ?
          and not exists (select 1 from sign_in_attempt s
            where s.account_key = a.account_key and s.succeeded and s.attempted_at > a.attempted_at)
        order by attempted_at`,
      [accountKey, new Date(now.getTime() - WINDOW_MS)],
    );
    if (failures.length > ATTEMPTS_MAX) {
      // Refused attempts do not count, or a guesser could keep the owner out for good.
      await em.nativeDelete(SignInAttempt, { id });
      const freeAt = Date.parse(failures[0].attempted_at) + WINDOW_MS;
      throw new TooManyAttemptsError(Math.ceil((freeAt - now.getTime()) / 1000));
    }
    return id;
  }

  private async mayOpen(em: EntityManager, user: User): Promise<boolean> {
    if (demoIsOpen(this.env)) return true;
    const setting = await em.findOne(ServiceSetting, { key: DEMO_SETTING });
    const demo = setting?.value as DemoSetting | undefined;
    return !demo?.users.some(({ id }) => id === user.id);
  }
}
