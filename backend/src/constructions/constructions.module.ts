import { Module } from '@nestjs/common';
import { ConstructionsController } from './constructions.controller.js';
import { ConstructionsService } from './constructions.service.js';

@Module({
  controllers: [ConstructionsController],
  providers: [ConstructionsService],
  exports: [ConstructionsService],
})
export class ConstructionsModule {}
