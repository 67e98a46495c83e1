import { Module } from '@nestjs/common';
import { PartsModule } from '../parts/parts.module.js';
import { RigModule } from '../rig/rig.module.js';
import { VesselReachModule } from '../vessels/vessel-reach.module.js';
import { VesselsModule } from '../vessels/vessels.module.js';
import { RigCopiesController } from './rig-copies.controller.js';
import { RigCsvService } from './rig-csv.service.js';
import { SistersService } from './sisters.service.js';

/** Rigs from files, to files and from other vessels. */
@Module({
  imports: [PartsModule, RigModule, VesselReachModule, VesselsModule],
  controllers: [RigCopiesController],
  providers: [RigCsvService, SistersService],
})
export class RigCopiesModule {}
