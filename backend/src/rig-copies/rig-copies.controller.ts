import { Body, Controller, Get, HttpCode, Param, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { importedRigSchema, importRigSchema, rigCsvSchema } from '@stayledger/shared/contracts/rig';
import { createSisterSchema, vesselSchema } from '@stayledger/shared/contracts/vessels';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { RigCsvService } from './rig-csv.service.js';
import { SistersService } from './sisters.service.js';

class VesselParams extends createZodDto(z.object({ vesselId: z.uuid() })) {}
class ImportRigBody extends createZodDto(importRigSchema) {}
class CreateSisterBody extends createZodDto(createSisterSchema) {}
class RigCsvReply extends createZodDto(rigCsvSchema) {}
class ImportedRigReply extends createZodDto(importedRigSchema) {}
class VesselReply extends createZodDto(vesselSchema) {}

@ApiTags('rig')
@Controller('vessels/:vesselId')
export class RigCopiesController {
  constructor(
    private readonly files: RigCsvService,
    private readonly sisters: SistersService,
  ) {}

  @Get('rig/csv')
  @RequirePermission('vessels:read')
  @ZodResponse({ type: RigCsvReply })
  write(@Me() me: Principal, @Param() { vesselId }: VesselParams) {
    return this.files.write(me, vesselId);
  }

  /** Says what a file would do, or does it when no line is wrong. */
  @Post('rig/csv')
  @HttpCode(200)
  @RequirePermission('rig:update')
  @ZodResponse({ type: ImportedRigReply, status: 200 })
  read(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: ImportRigBody) {
    return this.files.read(me, vesselId, body);
  }

  @Post('sisters')
  @RequirePermission('vessels:register')
  @ZodResponse({ type: VesselReply, status: 201 })
  sister(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: CreateSisterBody) {
    return this.sisters.create(me, vesselId, body);
  }
}
