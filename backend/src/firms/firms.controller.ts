import { Controller, Get, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { firmPageSchema } from '@stayledger/shared/contracts/firms';
import { pageQuerySchema } from '@stayledger/shared/contracts/pagination';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { FirmsService } from './firms.service.js';

class FirmPageQuery extends createZodDto(pageQuerySchema) {}
class FirmPageReply extends createZodDto(firmPageSchema) {}

@ApiTags('firms')
@Controller('firms')
export class FirmsController {
  constructor(private readonly firms: FirmsService) {}

  @Get()
  @RequirePermission('firms:read')
  @ZodResponse({ type: FirmPageReply })
  list(@Query() query: FirmPageQuery) {
    return this.firms.list(query);
  }
}
