import { Module } from '@nestjs/common';
import { AuditModule } from '../audit/audit.module.js';
import { AuthModule } from '../auth/auth.module.js';
import { LedgerModule } from '../ledger/ledger.module.js';
import { LifeModule } from '../life/life.module.js';
import { QueueModule } from '../queue/queue.module.js';
import { StorageModule } from '../storage/storage.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { DecisionsService } from './decisions.service.js';
import { LoadLogReplies } from './load-log-replies.js';
import { LoadLogsController } from './load-logs.controller.js';
import { LoadLogsService } from './load-logs.service.js';
import { LogIntake } from './log-intake.service.js';
import { LogReceiver } from './log-receiver.js';
import { PostingPlanService } from './posting-plan.service.js';
import { ReviewService } from './review.service.js';
import { UploadsHandler } from './uploads.handler.js';

@Module({
  imports: [AuditModule, AuthModule, LedgerModule, LifeModule, QueueModule, StorageModule, VesselReachModule],
  controllers: [LoadLogsController],
  providers: [
    DecisionsService,
    LoadLogReplies,
    LoadLogsService,
    LogIntake,
    LogReceiver,
    PostingPlanService,
    ReviewService,
    UploadsHandler,
  ],
  exports: [LogIntake, UploadsHandler],
})
export class LoadLogsModule {}
