import { Controller, Get, Param, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { ledgerPageSchema } from '@stayledger/shared/contracts/ledger';
import { pageQuerySchema } from '@stayledger/shared/contracts/pagination';
import { idSchema } from '@stayledger/shared/contracts/values';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { LedgerService } from './ledger.service.js';

class PartParams extends createZodDto(z.object({ partId: idSchema })) {}
class LedgerQuery extends createZodDto(pageQuerySchema) {}
class LedgerPageReply extends createZodDto(ledgerPageSchema) {}

@ApiTags('ledger')
@Controller('parts')
export class LedgerController {
  constructor(private readonly ledger: LedgerService) {}

  /** The account of a fitted part, newest entry first. */
  @Get(':partId/ledger')
  @RequirePermission('ledger:read')
  @ZodResponse({ type: LedgerPageReply })
  entries(@Me() me: Principal, @Param() { partId }: PartParams, @Query() query: LedgerQuery) {
    return this.ledger.entries(me, partId, query);
  }
}
