import { Module } from '@nestjs/common';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { JobsController } from './jobs.controller.js';
import { JobsService } from './jobs.service.js';

/** Reading job rows. The work itself is done in the workspace `jobs`. */
@Module({ imports: [VesselReachModule], controllers: [JobsController], providers: [JobsService] })
export class JobsModule {}
