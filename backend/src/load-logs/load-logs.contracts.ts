import {
  createLoadLogSchema,
  loadLogPageSchema,
  loadLogSchema,
  logReviewSchema,
  postLoadLogSchema,
  recountLoadLogSchema,
  rememberedMappingsSchema,
  reverseLoadLogSchema,
  setAsideLoadLogSchema,
} from '@stayledger/shared/contracts/load-logs';
import { pageQuerySchema } from '@stayledger/shared/contracts/pagination';
import { idSchema } from '@stayledger/shared/contracts/values';
import { createZodDto } from 'nestjs-zod';
import { z } from 'zod';

export class VesselParams extends createZodDto(z.object({ vesselId: idSchema })) {}
export class LoadLogParams extends createZodDto(z.object({ loadLogId: idSchema })) {}

export class CreateLoadLogBody extends createZodDto(createLoadLogSchema) {}
export class RecountLoadLogBody extends createZodDto(recountLoadLogSchema) {}
export class PostLoadLogBody extends createZodDto(postLoadLogSchema) {}
export class SetAsideLoadLogBody extends createZodDto(setAsideLoadLogSchema) {}
export class ReverseLoadLogBody extends createZodDto(reverseLoadLogSchema) {}
export class LoadLogsQuery extends createZodDto(pageQuerySchema) {}
export class LoadLogReply extends createZodDto(loadLogSchema) {}
export class LoadLogPageReply extends createZodDto(loadLogPageSchema) {}
export class LogReviewReply extends createZodDto(logReviewSchema) {}
export class RememberedMappingsReply extends createZodDto(rememberedMappingsSchema) {}
