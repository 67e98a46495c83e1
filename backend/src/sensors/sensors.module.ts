import { Module } from '@nestjs/common';
import { AuditModule } from '../audit/audit.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { SensorsController } from './sensors.controller.js';
import { SensorsService } from './sensors.service.js';

@Module({
  imports: [AuditModule, VesselReachModule],
  controllers: [SensorsController],
  providers: [SensorsService],
})
export class SensorsModule {}
