import {
  Body,
  Controller,
  Get,
  HttpCode,
  Inject,
  Param,
  Post,
  Query,
  Res,
  StreamableFile,
} from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { ZodResponse } from 'nestjs-zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { LOG_STORAGE, type LogStorage } from '../storage/log-storage.js';
import { attachmentHeader } from './attachment-header.js';
import { DecisionsService } from './decisions.service.js';
import {
  CreateLoadLogBody,
  LoadLogPageReply,
  LoadLogParams,
  LoadLogReply,
  LoadLogsQuery,
  LogReviewReply,
  PostLoadLogBody,
  RecountLoadLogBody,
  RememberedMappingsReply,
  ReverseLoadLogBody,
  SetAsideLoadLogBody,
  VesselParams,
} from './load-logs.contracts.js';
import { LoadLogsService } from './load-logs.service.js';
import { ReviewService } from './review.service.js';

@ApiTags('load-logs')
@Controller()
export class LoadLogsController {
  constructor(
    private readonly logs: LoadLogsService,
    private readonly decisions: DecisionsService,
    private readonly reviews: ReviewService,
    @Inject(LOG_STORAGE) private readonly storage: LogStorage,
  ) {}

  /** Announces a log; its bytes follow over tus at /api/uploads. */
  @Post('vessels/:vesselId/load-logs')
  @RequirePermission('load-logs:upload')
  @ZodResponse({ type: LoadLogReply, status: 201 })
  announce(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: CreateLoadLogBody) {
    return this.logs.announce(me, vesselId, body);
  }

  @Get('vessels/:vesselId/load-logs')
  @RequirePermission('load-logs:read')
  @ZodResponse({ type: LoadLogPageReply })
  list(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Query() query: LoadLogsQuery) {
    return this.logs.list(me, vesselId, query);
  }

  /** What columns of earlier logs were matched to. */
  @Get('vessels/:vesselId/channel-mappings')
  @RequirePermission('load-logs:read')
  @ZodResponse({ type: RememberedMappingsReply })
  rememberedMappings(@Me() me: Principal, @Param() { vesselId }: VesselParams) {
    return this.logs.rememberedMappings(me, vesselId);
  }

  @Get('load-logs/:loadLogId')
  @RequirePermission('load-logs:read')
  @ZodResponse({ type: LoadLogReply })
  get(@Me() me: Principal, @Param() { loadLogId }: LoadLogParams) {
    return this.logs.get(me, loadLogId);
  }

  /** Reads a failed or counted log again with another mapping. */
  @Post('load-logs/:loadLogId/recount')
  @HttpCode(200)
  @RequirePermission('load-logs:upload')
  @ZodResponse({ type: LoadLogReply, status: 200 })
  recount(@Me() me: Principal, @Param() { loadLogId }: LoadLogParams, @Body() body: RecountLoadLogBody) {
    return this.logs.recount(me, loadLogId, body);
  }

  /** Findings, traces, and what posting would do, without doing it. */
  @Get('load-logs/:loadLogId/review')
  @RequirePermission('load-logs:read')
  @ZodResponse({ type: LogReviewReply })
  review(@Me() me: Principal, @Param() { loadLogId }: LoadLogParams) {
    return this.reviews.review(me, loadLogId);
  }

  @Post('load-logs/:loadLogId/post')
  @HttpCode(200)
  @RequirePermission('load-logs:post')
  @ZodResponse({ type: LoadLogReply, status: 200 })
  post(@Me() me: Principal, @Param() { loadLogId }: LoadLogParams, @Body() body: PostLoadLogBody) {
    return this.decisions.post(me, loadLogId, body);
  }

  @Post('load-logs/:loadLogId/set-aside')
  @HttpCode(200)
  @RequirePermission('load-logs:post')
  @ZodResponse({ type: LoadLogReply, status: 200 })
  setAside(@Me() me: Principal, @Param() { loadLogId }: LoadLogParams, @Body() body: SetAsideLoadLogBody) {
    return this.decisions.setAside(me, loadLogId, body);
  }

  /** Takes a posted log back: reverses its entries, and lets it wait for a decision again. */
  @Post('load-logs/:loadLogId/reverse')
  @HttpCode(200)
  @RequirePermission('load-logs:post')
  @ZodResponse({ type: LoadLogReply, status: 200 })
  reverse(@Me() me: Principal, @Param() { loadLogId }: LoadLogParams, @Body() body: ReverseLoadLogBody) {
    return this.decisions.reverse(me, loadLogId, body);
  }

  /** The file as it was received. */
  @Get('load-logs/:loadLogId/file')
  @RequirePermission('load-logs:read')
  async file(
    @Me() me: Principal,
    @Param() { loadLogId }: LoadLogParams,
    @Res({ passthrough: true }) response: Response,
  ): Promise<StreamableFile> {
    const log = await this.logs.fileOf(me, loadLogId);
    response.setHeader('X-Content-Type-Options', 'nosniff');
    return new StreamableFile(this.storage.read({ vesselId: log.vessel, loadLogId: log.id }), {
      type: 'application/octet-stream',
      disposition: attachmentHeader(log.fileName),
      length: log.receivedBytes,
    });
  }
}
