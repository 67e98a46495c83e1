import { Body, Controller, Get, HttpCode, Param, Patch, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  assemblySchema,
  describedPartSchema,
  fitPartSchema,
  fittedPartSchema,
  removePartSchema,
  updatePartSchema,
} from '@stayledger/shared/contracts/parts';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { PartsService } from './parts.service.js';

class PartParams extends createZodDto(z.object({ partId: z.uuid() })) {}
class PositionParams extends createZodDto(z.object({ positionId: z.uuid() })) {}
class FitPartBody extends createZodDto(fitPartSchema) {}
class UpdatePartBody extends createZodDto(updatePartSchema) {}
class RemovePartBody extends createZodDto(removePartSchema) {}
class DescribedPartBody extends createZodDto(describedPartSchema) {}
class AssemblyReply extends createZodDto(assemblySchema) {}
class FittedPartReply extends createZodDto(fittedPartSchema) {}

@ApiTags('parts')
@Controller()
export class PartsController {
  constructor(private readonly parts: PartsService) {}

  @Post('positions/:positionId/parts')
  @RequirePermission('rig:update')
  @ZodResponse({ type: FittedPartReply, status: 201 })
  fit(@Me() me: Principal, @Param() { positionId }: PositionParams, @Body() body: FitPartBody) {
    return this.parts.fit(me, positionId, body);
  }

  /** How strong a part would be as assembled; nothing is stored. */
  @Post('part-strengths')
  @HttpCode(200)
  @RequirePermission('curves:read')
  @ZodResponse({ type: AssemblyReply, status: 200 })
  strength(@Me() me: Principal, @Body() body: DescribedPartBody) {
    return this.parts.strength(me, body);
  }

  @Get('parts/:partId')
  @RequirePermission('vessels:read')
  @ZodResponse({ type: FittedPartReply })
  get(@Me() me: Principal, @Param() { partId }: PartParams) {
    return this.parts.get(me, partId);
  }

  @Patch('parts/:partId')
  @RequirePermission('rig:update')
  @ZodResponse({ type: FittedPartReply })
  update(@Me() me: Principal, @Param() { partId }: PartParams, @Body() body: UpdatePartBody) {
    return this.parts.update(me, partId, body);
  }

  @Post('parts/:partId/remove')
  @HttpCode(200)
  @RequirePermission('rig:update')
  @ZodResponse({ type: FittedPartReply, status: 200 })
  remove(@Me() me: Principal, @Param() { partId }: PartParams, @Body() body: RemovePartBody) {
    return this.parts.remove(me, partId, body);
  }
}
