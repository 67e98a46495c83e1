import { Module } from '@nestjs/common';
import { ReachModule } from '../vessels/reach.module.js';
import { AuditEventsService } from './audit-events.service.js';
import { AuditController } from './audit.controller.js';
import { AuditService } from './audit.service.js';

@Module({
  imports: [ReachModule],
  controllers: [AuditController],
  providers: [AuditService, AuditEventsService],
  exports: [AuditService],
})
export class AuditModule {}
