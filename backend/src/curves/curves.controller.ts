import { Body, Controller, Get, Param, Post, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  addCurveSchema,
  curveListSchema,
  listedCurveSchema,
  reviseCurveSchema,
} from '@stayledger/shared/contracts/curves';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { CurvesService } from './curves.service.js';

class CurveReply extends createZodDto(listedCurveSchema) {}
class CurveListReply extends createZodDto(curveListSchema) {}
class AddCurveBody extends createZodDto(addCurveSchema) {}
class ReviseCurveBody extends createZodDto(reviseCurveSchema) {}
class CurveParams extends createZodDto(z.object({ curveId: z.string().max(120) })) {}
class CurveQuery extends createZodDto(
  z.strictObject({ version: z.coerce.number().int().min(1).optional() }),
) {}

@ApiTags('curves')
@Controller('curves')
export class CurvesController {
  constructor(private readonly curves: CurvesService) {}

  @Get()
  @RequirePermission('curves:read')
  @ZodResponse({ type: CurveListReply })
  list(@Me() me: Principal) {
    return this.curves.list(me);
  }

  @Get(':curveId')
  @RequirePermission('curves:read')
  @ZodResponse({ type: CurveReply })
  get(@Param() { curveId }: CurveParams, @Query() { version }: CurveQuery) {
    return this.curves.get(curveId, version);
  }

  @Post()
  @RequirePermission('curves:add')
  @ZodResponse({ type: CurveReply, status: 201 })
  add(@Me() me: Principal, @Body() body: AddCurveBody) {
    return this.curves.add(me, body);
  }

  @Post(':curveId/versions')
  @RequirePermission('curves:add')
  @ZodResponse({ type: CurveReply, status: 201 })
  revise(@Me() me: Principal, @Param() { curveId }: CurveParams, @Body() body: ReviseCurveBody) {
    return this.curves.revise(me, curveId, body);
  }
}
