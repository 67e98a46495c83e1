import { Module } from '@nestjs/common';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { AccountService } from './account.service.js';
import { LedgerController } from './ledger.controller.js';
import { LedgerService } from './ledger.service.js';
import { PartHistory } from './part-history.js';

@Module({
  imports: [VesselReachModule],
  controllers: [LedgerController],
  providers: [AccountService, LedgerService, PartHistory],
  exports: [AccountService, PartHistory],
})
export class LedgerModule {}
