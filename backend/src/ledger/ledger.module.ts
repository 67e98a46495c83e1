import { Module } from '@nestjs/common';
import { AuditModule } from '../audit/audit.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { AccountService } from './account.service.js';
import { LedgerCheck } from './ledger-check.js';
import { LedgerController } from './ledger.controller.js';
import { LedgerService } from './ledger.service.js';
import { PartHistory } from './part-history.js';

@Module({
  imports: [AuditModule, VesselReachModule],
  controllers: [LedgerController],
  providers: [AccountService, LedgerCheck, LedgerService, PartHistory],
  exports: [AccountService, PartHistory],
})
export class LedgerModule {}
