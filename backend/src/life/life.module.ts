import { Module } from '@nestjs/common';
import { AuditModule } from '../audit/audit.module.js';
import { LedgerModule } from '../ledger/ledger.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { LifeController } from './life.controller.js';
import { LifeService } from './life.service.js';
import { PartDetailsService } from './part-details.service.js';
import { PartStandingService } from './part-standing.service.js';
import { UsagePlansService } from './usage-plans.service.js';

@Module({
  imports: [AuditModule, LedgerModule, VesselReachModule],
  controllers: [LifeController],
  providers: [LifeService, PartDetailsService, PartStandingService, UsagePlansService],
  exports: [PartDetailsService, PartStandingService],
})
export class LifeModule {}
