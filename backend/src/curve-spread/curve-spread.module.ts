import { Module } from '@nestjs/common';
import { LedgerModule } from '../ledger/ledger.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { CurveSpreadController } from './curve-spread.controller.js';
import { CurveSpreadService } from './curve-spread.service.js';

@Module({
  imports: [LedgerModule, VesselReachModule],
  controllers: [CurveSpreadController],
  providers: [CurveSpreadService],
})
export class CurveSpreadModule {}
