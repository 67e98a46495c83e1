import { Module } from '@nestjs/common';
import { AuditModule } from '../audit/audit.module.js';
import { QueueModule } from '../queue/queue.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { RerigSchedulesController } from './rerig-schedules.controller.js';
import { RerigSchedulesService } from './rerig-schedules.service.js';
import { YardTermsService } from './yard-terms.service.js';

@Module({
  imports: [AuditModule, QueueModule, VesselReachModule],
  controllers: [RerigSchedulesController],
  providers: [RerigSchedulesService, YardTermsService],
})
export class RerigSchedulesModule {}
