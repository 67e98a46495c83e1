import { Module } from '@nestjs/common';
import { AuditModule } from '../audit/audit.module.js';
import { ConstructionsModule } from '../constructions/constructions.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { PartFiguresModule } from './part-figures.module.js';
import { PartsController } from './parts.controller.js';
import { PartsService } from './parts.service.js';

@Module({
  imports: [AuditModule, ConstructionsModule, PartFiguresModule, VesselReachModule],
  controllers: [PartsController],
  providers: [PartsService],
  exports: [PartsService],
})
export class PartsModule {}
