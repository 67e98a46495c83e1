import { Controller, Get, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { auditPageSchema, auditQuerySchema } from '@stayledger/shared/contracts/audit';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { AuditEventsService } from './audit-events.service.js';

class AuditQuery extends createZodDto(auditQuerySchema) {}
class AuditPageReply extends createZodDto(auditPageSchema) {}

@ApiTags('audit')
@Controller('audit-events')
export class AuditController {
  constructor(private readonly events: AuditEventsService) {}

  @Get()
  @RequirePermission('audit:read')
  @ZodResponse({ type: AuditPageReply })
  list(@Me() me: Principal, @Query() query: AuditQuery) {
    return this.events.list(me, query);
  }
}
