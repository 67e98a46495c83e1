import { Module } from '@nestjs/common';
import { OwnReferenceModule } from '../own-reference/own-reference.module.js';
import { CurvesController } from './curves.controller.js';
import { CurvesService } from './curves.service.js';

@Module({
  imports: [OwnReferenceModule],
  controllers: [CurvesController],
  providers: [CurvesService],
  exports: [CurvesService],
})
export class CurvesModule {}
