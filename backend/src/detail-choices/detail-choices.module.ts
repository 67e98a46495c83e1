import { Module } from '@nestjs/common';
import { AuditModule } from '../audit/audit.module.js';
import { CurvesModule } from '../curves/curves.module.js';
import { LedgerModule } from '../ledger/ledger.module.js';
import { LifeModule } from '../life/life.module.js';
import { PartFiguresModule } from '../parts/part-figures.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { DetailChoicesController } from './detail-choices.controller.js';
import { DetailChoicesService } from './detail-choices.service.js';

@Module({
  imports: [AuditModule, CurvesModule, LedgerModule, LifeModule, PartFiguresModule, VesselReachModule],
  controllers: [DetailChoicesController],
  providers: [DetailChoicesService],
})
export class DetailChoicesModule {}
