import { Module } from '@nestjs/common';
import { ConstructionsModule } from '../constructions/constructions.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { PositionHistoryController } from './position-history.controller.js';
import { PositionHistoryService } from './position-history.service.js';

@Module({
  imports: [ConstructionsModule, VesselReachModule],
  controllers: [PositionHistoryController],
  providers: [PositionHistoryService],
})
export class PositionHistoryModule {}
