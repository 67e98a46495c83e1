import { Module } from '@nestjs/common';
import { OwnReferenceModule } from '../own-reference/own-reference.module.js';
import { ConstructionsController } from './constructions.controller.js';
import { ConstructionsService } from './constructions.service.js';

@Module({
  imports: [OwnReferenceModule],
  controllers: [ConstructionsController],
  providers: [ConstructionsService],
  exports: [ConstructionsService],
})
export class ConstructionsModule {}
