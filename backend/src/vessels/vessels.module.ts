import { Module } from '@nestjs/common';
import { AuditModule } from '../audit/audit.module.js';
import { PartFiguresModule } from '../parts/part-figures.module.js';
import { FleetList } from './fleet-list.js';
import { VesselReachModule } from './vessel-reach.module.js';
import { VesselsController } from './vessels.controller.js';
import { VesselsService } from './vessels.service.js';

@Module({
  imports: [AuditModule, PartFiguresModule, VesselReachModule],
  controllers: [VesselsController],
  providers: [VesselsService, FleetList],
  exports: [VesselsService],
})
export class VesselsModule {}
