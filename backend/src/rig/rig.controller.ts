import { Body, Controller, Get, Param, Patch, Post, Put } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  applyTemplateSchema,
  createPairSchema,
  createPositionSchema,
  drawnRigSchema,
  positionSchema,
  rigSchema,
  saveGeometrySchema,
  updatePositionSchema,
} from '@stayledger/shared/contracts/rig';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { RigGeometryService } from './rig-geometry.service.js';
import { RigService } from './rig.service.js';

class VesselParams extends createZodDto(z.object({ vesselId: z.uuid() })) {}
class PositionParams extends createZodDto(z.object({ positionId: z.uuid() })) {}
class CreatePositionBody extends createZodDto(createPositionSchema) {}
class UpdatePositionBody extends createZodDto(updatePositionSchema) {}
class CreatePairBody extends createZodDto(createPairSchema) {}
class ApplyTemplateBody extends createZodDto(applyTemplateSchema) {}
class SaveGeometryBody extends createZodDto(saveGeometrySchema) {}
class DrawnRigReply extends createZodDto(drawnRigSchema) {}
class PositionReply extends createZodDto(positionSchema) {}
class RigReply extends createZodDto(rigSchema) {}

@ApiTags('rig')
@Controller()
export class RigController {
  constructor(
    private readonly rigs: RigService,
    private readonly geometries: RigGeometryService,
  ) {}

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

  /** Port and starboard entered once. */
  @Post('vessels/:vesselId/position-pairs')
  @RequirePermission('rig:update')
  @ZodResponse({ type: RigReply, status: 201 })
  addPair(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: CreatePairBody) {
    return this.rigs.addPair(me, vesselId, body);
  }

  /** Adds the positions of a rig type that are not there yet. */
  @Post('vessels/:vesselId/rig/template')
  @RequirePermission('rig:update')
  @ZodResponse({ type: RigReply, status: 201 })
  async applyTemplate(
    @Me() me: Principal,
    @Param() { vesselId }: VesselParams,
    @Body() body: ApplyTemplateBody,
  ) {
    await this.geometries.applyTemplate(me, vesselId, body);
    return this.rigs.rig(me, vesselId);
  }

  @Get('vessels/:vesselId/rig/geometry')
  @RequirePermission('vessels:read')
  @ZodResponse({ type: DrawnRigReply })
  geometry(@Me() me: Principal, @Param() { vesselId }: VesselParams) {
    return this.geometries.drawn(me, vesselId);
  }

  @Put('vessels/:vesselId/rig/geometry')
  @RequirePermission('rig:update')
  @ZodResponse({ type: DrawnRigReply })
  saveGeometry(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: SaveGeometryBody) {
    return this.geometries.save(me, vesselId, body);
  }

  @Patch('positions/:positionId')
  @RequirePermission('rig:update')
  @ZodResponse({ type: PositionReply })
  update(@Me() me: Principal, @Param() { positionId }: PositionParams, @Body() body: UpdatePositionBody) {
    return this.rigs.updatePosition(me, positionId, body);
  }
}
