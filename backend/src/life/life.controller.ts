import { Body, Controller, Get, Param, Put } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  partLifeSchema,
  stateUsagePlanSchema,
  usagePlanReplySchema,
} from '@stayledger/shared/contracts/life';
import { idSchema } from '@stayledger/shared/contracts/values';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { LifeService } from './life.service.js';
import { UsagePlansService } from './usage-plans.service.js';

class PartParams extends createZodDto(z.object({ partId: idSchema })) {}
class VesselParams extends createZodDto(z.object({ vesselId: idSchema })) {}
class PartLifeReply extends createZodDto(partLifeSchema) {}
class StateUsagePlanBody extends createZodDto(stateUsagePlanSchema) {}
class UsagePlanReply extends createZodDto(usagePlanReplySchema) {}

@ApiTags('life')
@Controller()
export class LifeController {
  constructor(
    private readonly life: LifeService,
    private readonly plans: UsagePlansService,
  ) {}

  /** Allowance used, dates, and the way each figure was come by. */
  @Get('parts/:partId/life')
  @RequirePermission('life:read')
  @ZodResponse({ type: PartLifeReply })
  ofPart(@Me() me: Principal, @Param() { partId }: PartParams) {
    return this.life.ofPart(me, partId);
  }

  @Get('vessels/:vesselId/usage-plan')
  @RequirePermission('life:read')
  @ZodResponse({ type: UsagePlanReply })
  usagePlan(@Me() me: Principal, @Param() { vesselId }: VesselParams) {
    return this.plans.get(me, vesselId);
  }

  @Put('vessels/:vesselId/usage-plan')
  @RequirePermission('usage:state')
  @ZodResponse({ type: UsagePlanReply })
  stateUsagePlan(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: StateUsagePlanBody) {
    return this.plans.state(me, vesselId, body);
  }
}
