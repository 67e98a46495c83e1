import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import { AccountService } from '../ledger/account.service.js';
import { PartDetailsService } from '../life/part-details.service.js';
import { PartStandingService } from '../life/part-standing.service.js';
import type { FittedPart } from './fitted-part.entity.js';

/** Keeps what is computed of a part in step with its description, in the running transaction. */
@Injectable()
export class PartFigures {
  constructor(
    private readonly em: EntityManager,
    private readonly details: PartDetailsService,
    private readonly accounts: AccountService,
    private readonly standings: PartStandingService,
  ) {}

  /**
   * Lays out the details anew, brings the account to what they say (by reversing and adding, never by editing), and
   * computes where the part stands. The caller holds the row of the part locked, or has just made it.
   *
   * @param why stands beside each entry this reverses
   */
  async refresh(part: FittedPart, userId: string, why: string | null = null): Promise<void> {
    await this.details.describe(this.em, part);
    await this.accounts.settle(this.em, part, userId, why);
    await this.standings.recompute(this.em, part.id);
  }

  /** Only the standings of the parts on a vessel: her age or use was stated differently. */
  async refreshStandings(vesselId: string): Promise<void> {
    await this.standings.recomputeVessel(this.em, vesselId);
  }
}
