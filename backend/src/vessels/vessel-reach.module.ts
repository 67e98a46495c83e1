import { Module } from '@nestjs/common';
import { VesselReach } from './vessel-reach.service.js';

/** Apart from `VesselsModule`, so that every feature may ask for reach without importing the features of vessels. */
@Module({ providers: [VesselReach], exports: [VesselReach] })
export class VesselReachModule {}
