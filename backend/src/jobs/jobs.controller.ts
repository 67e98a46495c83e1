import { Controller, Get, Param, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { jobPageSchema, jobSchema } from '@stayledger/shared/contracts/jobs';
import { pageQuerySchema } from '@stayledger/shared/contracts/pagination';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { JobsService } from './jobs.service.js';

class JobParams extends createZodDto(z.object({ jobId: z.uuid() })) {}
class JobPageQuery extends createZodDto(pageQuerySchema) {}
class JobPageReply extends createZodDto(jobPageSchema) {}
class JobReply extends createZodDto(jobSchema) {}

@ApiTags('jobs')
@Controller('jobs')
export class JobsController {
  constructor(private readonly jobs: JobsService) {}

  @Get()
  @RequirePermission('jobs:administer')
  @ZodResponse({ type: JobPageReply })
  list(@Query() query: JobPageQuery) {
    return this.jobs.list(query);
  }

  /** What the browser polls while a log is counted. */
  @Get(':jobId')
  @RequirePermission('load-logs:read')
  @ZodResponse({ type: JobReply })
  get(@Me() me: Principal, @Param() { jobId }: JobParams) {
    return this.jobs.get(me, jobId);
  }
}
