import { Controller, Get, Param } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { positionHistorySchema } from '@stayledger/shared/contracts/position-history';
import { idSchema } from '@stayledger/shared/contracts/values';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { PositionHistoryService } from './position-history.service.js';

class PositionParams extends createZodDto(z.object({ positionId: idSchema })) {}
class PositionHistoryReply extends createZodDto(positionHistorySchema) {}

@ApiTags('position-history')
@Controller()
export class PositionHistoryController {
  constructor(private readonly history: PositionHistoryService) {}

  /** All parts a place on the rig has had, each with its account. */
  @Get('positions/:positionId/history')
  @RequirePermission('life:read')
  @ZodResponse({ type: PositionHistoryReply })
  of(@Me() me: Principal, @Param() { positionId }: PositionParams) {
    return this.history.of(me, positionId);
  }
}
