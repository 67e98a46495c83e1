import { Module } from '@nestjs/common';
import { AuditModule } from '../audit/audit.module.js';
import { ConstructionsModule } from '../constructions/constructions.module.js';
import { PartFiguresModule } from '../parts/part-figures.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { RigController } from './rig.controller.js';
import { RigGeometryService } from './rig-geometry.service.js';
import { RigService } from './rig.service.js';

@Module({
  imports: [AuditModule, ConstructionsModule, PartFiguresModule, VesselReachModule],
  controllers: [RigController],
  providers: [RigService, RigGeometryService],
  exports: [RigService],
})
export class RigModule {}
