import { Controller, Get, Param } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { curveSpreadSchema } from '@stayledger/shared/contracts/curve-spread';
import { idSchema } from '@stayledger/shared/contracts/values';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { CurveSpreadService } from './curve-spread.service.js';

class PartParams extends createZodDto(z.object({ partId: idSchema })) {}
class CurveSpreadReply extends createZodDto(curveSpreadSchema) {}

@ApiTags('curve-spread')
@Controller('parts')
export class CurveSpreadController {
  constructor(private readonly spread: CurveSpreadService) {}

  /** The recorded history of a wire on each strand curve, side by side. */
  @Get(':partId/curve-spread')
  @RequirePermission('life:read')
  @ZodResponse({ type: CurveSpreadReply })
  ofPart(@Me() me: Principal, @Param() { partId }: PartParams) {
    return this.spread.ofPart(me, partId);
  }
}
