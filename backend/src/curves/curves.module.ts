import { Module } from '@nestjs/common';
import { CurvesController } from './curves.controller.js';
import { CurvesService } from './curves.service.js';

@Module({ controllers: [CurvesController], providers: [CurvesService] })
export class CurvesModule {}
