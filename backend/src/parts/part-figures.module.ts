import { Module } from '@nestjs/common';
import { LedgerModule } from '../ledger/ledger.module.js';
import { LifeModule } from '../life/life.module.js';
import { PartFigures } from './part-figures.service.js';

@Module({ imports: [LedgerModule, LifeModule], providers: [PartFigures], exports: [PartFigures] })
export class PartFiguresModule {}
