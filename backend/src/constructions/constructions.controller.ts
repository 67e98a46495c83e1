import { Controller, Get } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { constructionListSchema } from '@stayledger/shared/contracts/constructions';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { ConstructionsService } from './constructions.service.js';

class ConstructionListReply extends createZodDto(constructionListSchema) {}

@ApiTags('constructions')
@Controller('constructions')
export class ConstructionsController {
  constructor(private readonly constructions: ConstructionsService) {}

  @Get()
  @RequirePermission('curves:read')
  @ZodResponse({ type: ConstructionListReply })
  list(@Me() me: Principal) {
    return this.constructions.list(me);
  }
}
