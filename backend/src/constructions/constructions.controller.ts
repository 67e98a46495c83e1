import { Body, Controller, Get, Param, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  addConstructionSchema,
  constructionListSchema,
  listedConstructionSchema,
  reviseConstructionSchema,
} from '@stayledger/shared/contracts/constructions';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { ConstructionsService } from './constructions.service.js';

class ConstructionListReply extends createZodDto(constructionListSchema) {}
class ConstructionReply extends createZodDto(listedConstructionSchema) {}
class AddConstructionBody extends createZodDto(addConstructionSchema) {}
class ReviseConstructionBody extends createZodDto(reviseConstructionSchema) {}
class ConstructionParams extends createZodDto(z.object({ constructionId: z.string().max(120) })) {}

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

  @Post()
  @RequirePermission('curves:add')
  @ZodResponse({ type: ConstructionReply, status: 201 })
  add(@Me() me: Principal, @Body() body: AddConstructionBody) {
    return this.constructions.add(me, body);
  }

  @Post(':constructionId/versions')
  @RequirePermission('curves:add')
  @ZodResponse({ type: ConstructionReply, status: 201 })
  revise(
    @Me() me: Principal,
    @Param() { constructionId }: ConstructionParams,
    @Body() body: ReviseConstructionBody,
  ) {
    return this.constructions.revise(me, constructionId, body);
  }
}
