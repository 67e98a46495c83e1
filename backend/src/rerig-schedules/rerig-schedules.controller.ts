import { Body, Controller, Get, Header, HttpCode, Param, Post, Put, StreamableFile } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  answerPlanSchema,
  moveScheduleSchema,
  requestPlanSchema,
  rerigScheduleSchema,
  scheduleSettingsSchema,
  undoPlanSchema,
} from '@stayledger/shared/contracts/rerig-schedules';
import { idSchema } from '@stayledger/shared/contracts/values';
import { stateYardTermsSchema, yardTermsReplySchema } from '@stayledger/shared/contracts/yard-terms';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { attachmentHeader } from '../load-logs/attachment-header.js';
import { RerigSchedulesService } from './rerig-schedules.service.js';
import { scheduleCalendar } from './schedule-calendar.js';
import { YardTermsService } from './yard-terms.service.js';

class VesselParams extends createZodDto(z.object({ vesselId: idSchema })) {}
class RerigScheduleReply extends createZodDto(rerigScheduleSchema) {}
class RequestPlanBody extends createZodDto(requestPlanSchema) {}
class ScheduleSettingsBody extends createZodDto(scheduleSettingsSchema) {}
class UndoPlanBody extends createZodDto(undoPlanSchema) {}
class MoveScheduleBody extends createZodDto(moveScheduleSchema) {}
class AnswerPlanBody extends createZodDto(answerPlanSchema) {}
class YardTermsReply extends createZodDto(yardTermsReplySchema) {}
class StateYardTermsBody extends createZodDto(stateYardTermsSchema) {}

@ApiTags('rerig-schedules')
@Controller()
export class RerigSchedulesController {
  constructor(
    private readonly schedules: RerigSchedulesService,
    private readonly terms: YardTermsService,
  ) {}

  @Get('vessels/:vesselId/rerig-schedule')
  @RequirePermission('rerig:read')
  @ZodResponse({ type: RerigScheduleReply })
  get(@Me() me: Principal, @Param() { vesselId }: VesselParams) {
    return this.schedules.get(me, vesselId);
  }

  /** Asks for a plan; it is made in the background, and `planning` tells how far it is. */
  @Post('vessels/:vesselId/rerig-schedule/plans')
  @HttpCode(202)
  @RequirePermission('rerig:plan')
  @ZodResponse({ type: RerigScheduleReply, status: 202 })
  request(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: RequestPlanBody) {
    return this.schedules.request(me, vesselId, body);
  }

  @Put('vessels/:vesselId/rerig-schedule/settings')
  @RequirePermission('rerig:plan')
  @ZodResponse({ type: RerigScheduleReply })
  settings(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: ScheduleSettingsBody) {
    return this.schedules.settings(me, vesselId, body);
  }

  @Post('vessels/:vesselId/rerig-schedule/undo')
  @HttpCode(200)
  @RequirePermission('rerig:plan')
  @ZodResponse({ type: RerigScheduleReply, status: 200 })
  undo(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: UndoPlanBody) {
    return this.schedules.undo(me, vesselId, body.version);
  }

  @Post('vessels/:vesselId/rerig-schedule/state')
  @HttpCode(200)
  @RequirePermission('rerig:plan')
  @ZodResponse({ type: RerigScheduleReply, status: 200 })
  move(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: MoveScheduleBody) {
    return this.schedules.move(me, vesselId, body);
  }

  /** The owner accepts the proposed plan, or asks about it. */
  @Post('vessels/:vesselId/rerig-schedule/answer')
  @HttpCode(200)
  @RequirePermission('rerig:accept')
  @ZodResponse({ type: RerigScheduleReply, status: 200 })
  answer(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: AnswerPlanBody) {
    return this.schedules.answer(me, vesselId, body);
  }

  /** Visits and order-by days as an iCalendar file. */
  @Get('vessels/:vesselId/rerig-schedule/calendar')
  @RequirePermission('rerig:read')
  @Header('X-Content-Type-Options', 'nosniff')
  async calendar(@Me() me: Principal, @Param() { vesselId }: VesselParams): Promise<StreamableFile> {
    const { vessel, plan } = await this.schedules.standing(me, vesselId);
    return new StreamableFile(Buffer.from(scheduleCalendar(vessel, plan), 'utf8'), {
      type: 'text/calendar; charset=utf-8',
      disposition: attachmentHeader(`${vessel.name} re-rig schedule.ics`),
    });
  }

  /** Of the firm through which the person plans. */
  @Get('yard-terms')
  @RequirePermission('rerig:plan')
  @ZodResponse({ type: YardTermsReply })
  yardTerms(@Me() me: Principal) {
    return this.terms.get(me);
  }

  @Put('yard-terms')
  @RequirePermission('rerig:plan')
  @ZodResponse({ type: YardTermsReply })
  stateYardTerms(@Me() me: Principal, @Body() body: StateYardTermsBody) {
    return this.terms.state(me, body);
  }
}
