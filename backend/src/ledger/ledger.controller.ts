import { Controller, Get, HttpCode, Param, Post, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { ledgerCheckSchema, ledgerPageSchema } from '@stayledger/shared/contracts/ledger';
import { pageQuerySchema } from '@stayledger/shared/contracts/pagination';
import { idSchema } from '@stayledger/shared/contracts/values';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { LedgerService } from './ledger.service.js';

class PartParams extends createZodDto(z.object({ partId: idSchema })) {}
class VesselParams extends createZodDto(z.object({ vesselId: idSchema })) {}
class LedgerCheckReply extends createZodDto(ledgerCheckSchema) {}
class LedgerQuery extends createZodDto(pageQuerySchema) {}
class LedgerPageReply extends createZodDto(ledgerPageSchema) {}

@ApiTags('ledger')
@Controller()
export class LedgerController {
  constructor(private readonly ledger: LedgerService) {}

  /** The account of a fitted part, newest entry first. */
  @Get('parts/:partId/ledger')
  @RequirePermission('ledger:read')
  @ZodResponse({ type: LedgerPageReply })
  entries(@Me() me: Principal, @Param() { partId }: PartParams, @Query() query: LedgerQuery) {
    return this.ledger.entries(me, partId, query);
  }

  /** Recomputes every hash and every amount of a vessel's accounts and says what differs. Changes no entry. */
  @Post('vessels/:vesselId/ledger/check')
  @HttpCode(200)
  @RequirePermission('ledger:check')
  @ZodResponse({ type: LedgerCheckReply, status: 200 })
  check(@Me() me: Principal, @Param() { vesselId }: VesselParams) {
    return this.ledger.check(me, vesselId);
  }
}
