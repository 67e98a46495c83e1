import { Body, Controller, Get, Param, Patch, Post, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  createVesselSchema,
  updateVesselSchema,
  vesselListQuerySchema,
  vesselPageSchema,
  vesselSchema,
} from '@stayledger/shared/contracts/vessels';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { FleetList } from './fleet-list.js';
import { VesselsService } from './vessels.service.js';

class VesselParams extends createZodDto(z.object({ vesselId: z.uuid() })) {}
class VesselListQuery extends createZodDto(vesselListQuerySchema) {}
class CreateVesselBody extends createZodDto(createVesselSchema) {}
class UpdateVesselBody extends createZodDto(updateVesselSchema) {}
class VesselReply extends createZodDto(vesselSchema) {}
class VesselPageReply extends createZodDto(vesselPageSchema) {}

@ApiTags('vessels')
@Controller('vessels')
export class VesselsController {
  constructor(
    private readonly vessels: VesselsService,
    private readonly fleet: FleetList,
  ) {}

  /** The fleet of whoever asks: of their firms, their own, and what was shared with them. */
  @Get()
  @RequirePermission('vessels:read')
  @ZodResponse({ type: VesselPageReply })
  list(@Me() me: Principal, @Query() query: VesselListQuery) {
    return this.fleet.page(me, query);
  }

  @Post()
  @RequirePermission('vessels:register')
  @ZodResponse({ type: VesselReply, status: 201 })
  register(@Me() me: Principal, @Body() body: CreateVesselBody) {
    return this.vessels.register(me, body);
  }

  @Get(':vesselId')
  @RequirePermission('vessels:read')
  @ZodResponse({ type: VesselReply })
  get(@Me() me: Principal, @Param() { vesselId }: VesselParams) {
    return this.vessels.get(me, vesselId);
  }

  @Patch(':vesselId')
  @RequirePermission('vessels:update')
  @ZodResponse({ type: VesselReply })
  update(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: UpdateVesselBody) {
    return this.vessels.update(me, vesselId, body);
  }
}
