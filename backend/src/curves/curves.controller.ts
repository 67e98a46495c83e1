import { Controller, Get, Param, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { curveListSchema, curveSchema } from '@stayledger/shared/contracts/curves';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { CurvesService } from './curves.service.js';

class CurveReply extends createZodDto(curveSchema) {}
class CurveListReply extends createZodDto(curveListSchema) {}
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
  get(@Me() me: Principal, @Param() { curveId }: CurveParams, @Query() { version }: CurveQuery) {
    return this.curves.get(me, curveId, version);
  }
}
