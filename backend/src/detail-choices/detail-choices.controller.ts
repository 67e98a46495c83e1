import { Body, Controller, Get, HttpCode, Param, Post, Put } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  chooseDetailSchema,
  detailChoiceEffectSchema,
  detailChoicesSchema,
  previewDetailChoiceSchema,
} from '@stayledger/shared/contracts/detail-choices';
import { idSchema } from '@stayledger/shared/contracts/values';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { DetailChoicesService } from './detail-choices.service.js';

class PartParams extends createZodDto(z.object({ partId: idSchema })) {}
class DetailParams extends createZodDto(
  z.object({ partId: idSchema, detailKey: z.string().min(1).max(60) }),
) {}
class PreviewBody extends createZodDto(previewDetailChoiceSchema) {}
class ChooseBody extends createZodDto(chooseDetailSchema) {}
class DetailChoicesReply extends createZodDto(detailChoicesSchema) {}
class DetailChoiceEffectReply extends createZodDto(detailChoiceEffectSchema) {}

@ApiTags('detail-choices')
@Controller('parts')
export class DetailChoicesController {
  constructor(private readonly choices: DetailChoicesService) {}

  /** The details of a part, what was decided about each, and the curves that may be chosen. */
  @Get(':partId/detail-choices')
  @RequirePermission('life:read')
  @ZodResponse({ type: DetailChoicesReply })
  list(@Me() me: Principal, @Param() { partId }: PartParams) {
    return this.choices.list(me, partId);
  }

  /** What a choice would do to allowance and account, without doing it. */
  @Post(':partId/detail-choices/:detailKey/preview')
  @HttpCode(200)
  @RequirePermission('rig:update')
  @ZodResponse({ type: DetailChoiceEffectReply, status: 200 })
  preview(@Me() me: Principal, @Param() { partId, detailKey }: DetailParams, @Body() body: PreviewBody) {
    return this.choices.preview(me, partId, detailKey, body);
  }

  /** Puts a choice in place of the defaults, with what it rests on. */
  @Put(':partId/detail-choices/:detailKey')
  @RequirePermission('rig:update')
  @ZodResponse({ type: DetailChoicesReply })
  choose(@Me() me: Principal, @Param() { partId, detailKey }: DetailParams, @Body() body: ChooseBody) {
    return this.choices.choose(me, partId, detailKey, body);
  }
}
