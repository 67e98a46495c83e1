import { Module } from '@nestjs/common';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { AuditEventsService } from './audit-events.service.js';
import { AuditController } from './audit.controller.js';
import { AuditService } from './audit.service.js';

@Module({
  imports: [VesselReachModule],
  controllers: [AuditController],
  providers: [AuditService, AuditEventsService],
  exports: [AuditService],
})
export class AuditModule {}
