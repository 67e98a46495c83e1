import { Body, Controller, Get, Param, Patch, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  createPositionSchema,
  positionSchema,
  rigSchema,
  updatePositionSchema,
} from '@stayledger/shared/contracts/rig';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { RigService } from './rig.service.js';

class VesselParams extends createZodDto(z.object({ vesselId: z.uuid() })) {}
class PositionParams extends createZodDto(z.object({ positionId: z.uuid() })) {}
class CreatePositionBody extends createZodDto(createPositionSchema) {}
class UpdatePositionBody extends createZodDto(updatePositionSchema) {}
class PositionReply extends createZodDto(positionSchema) {}
class RigReply extends createZodDto(rigSchema) {}

@ApiTags('rig')
@Controller()
export class RigController {
  constructor(private readonly rigs: RigService) {}

  @Get('vessels/:vesselId/rig')
  @RequirePermission('vessels:read')
  @ZodResponse({ type: RigReply })
  rig(@Me() me: Principal, @Param() { vesselId }: VesselParams) {
    return this.rigs.rig(me, vesselId);
  }

  @Post('vessels/:vesselId/positions')
  @RequirePermission('rig:update')
  @ZodResponse({ type: PositionReply, status: 201 })
  add(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: CreatePositionBody) {
    return this.rigs.addPosition(me, vesselId, body);
  }

  @Patch('positions/:positionId')
  @RequirePermission('rig:update')
  @ZodResponse({ type: PositionReply })
  update(@Me() me: Principal, @Param() { positionId }: PositionParams, @Body() body: UpdatePositionBody) {
    return this.rigs.updatePosition(me, positionId, body);
  }
}
