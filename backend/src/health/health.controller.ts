import { EntityManager } from '@mikro-orm/postgresql';
import { Controller, Get } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { Public } from '../auth/access.decorators.js';
import { Clock } from '../common/clock/clock.js';

class HealthReply extends createZodDto(z.object({ status: z.literal('ok'), at: z.iso.datetime() })) {}

@ApiTags('health')
@Controller('health')
export class HealthController {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
  ) {}

  /** 200 when the database answers; without it the error filter says 503. */
  @Get()
  @Public()
  @ZodResponse({ type: HealthReply })
  async health() {
    await this.em.execute('select 1');
    return { status: 'ok' as const, at: this.clock.now().toISOString() };
  }
}
