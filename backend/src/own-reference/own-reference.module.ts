import { Module } from '@nestjs/common';
import { AuditModule } from '../audit/audit.module.js';
import { OwnReferenceService } from './own-reference.service.js';

@Module({ imports: [AuditModule], providers: [OwnReferenceService], exports: [OwnReferenceService] })
export class OwnReferenceModule {}
