import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable, Logger } from '@nestjs/common';
import { Interval } from '@nestjs/schedule';
import { Clock } from '../common/clock/clock.js';

const EVERY_MS = 15 * 60_000;
const KEEP_ATTEMPTS_MS = 24 * 3_600_000;

/** Removes what has run out. Several processes may do so at once; deleting twice is deleting once. */
@Injectable()
export class HousekeepingService {
  private readonly logger = new Logger(HousekeepingService.name);

  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
  ) {}

  @Interval(EVERY_MS)
  async prune(): Promise<void> {
    const em = this.em.fork();
    const now = this.clock.now();
    try {
      await em.execute(`delete from session where expire < (?::timestamptz at time zone 'UTC')`, [now]);
      await em.execute('delete from sign_in_attempt where attempted_at < ?', [
        new Date(now.getTime() - KEEP_ATTEMPTS_MS),
      ]);
    } catch (error) {
      this.logger.warn(`Old sessions stay until the next round: ${String(error)}`);
    }
  }
}
