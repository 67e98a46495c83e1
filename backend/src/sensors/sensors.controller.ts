import { Body, Controller, Get, Param, Patch, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { loadBasesSchema } from '@stayledger/shared/contracts/rig';
import {
  addSensorEventSchema,
  addSensorSchema,
  sensorListSchema,
  sensorSchema,
  updateSensorSchema,
} from '@stayledger/shared/contracts/sensors';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { z } from 'zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { Me, type Principal } from '../auth/principal.js';
import { SensorsService } from './sensors.service.js';

class VesselParams extends createZodDto(z.object({ vesselId: z.uuid() })) {}
class SensorParams extends createZodDto(z.object({ sensorId: z.uuid() })) {}
class AddSensorBody extends createZodDto(addSensorSchema) {}
class UpdateSensorBody extends createZodDto(updateSensorSchema) {}
class AddSensorEventBody extends createZodDto(addSensorEventSchema) {}
class SensorReply extends createZodDto(sensorSchema) {}
class SensorListReply extends createZodDto(sensorListSchema) {}
class LoadBasesReply extends createZodDto(loadBasesSchema) {}

@ApiTags('sensors')
@Controller()
export class SensorsController {
  constructor(private readonly sensors: SensorsService) {}

  @Get('vessels/:vesselId/sensors')
  @RequirePermission('vessels:read')
  @ZodResponse({ type: SensorListReply })
  list(@Me() me: Principal, @Param() { vesselId }: VesselParams) {
    return this.sensors.list(me, vesselId);
  }

  /** Where the loads of each place can come from, and how to improve it. */
  @Get('vessels/:vesselId/load-bases')
  @RequirePermission('vessels:read')
  @ZodResponse({ type: LoadBasesReply })
  loadBases(@Me() me: Principal, @Param() { vesselId }: VesselParams) {
    return this.sensors.loadBases(me, vesselId);
  }

  @Post('vessels/:vesselId/sensors')
  @RequirePermission('rig:update')
  @ZodResponse({ type: SensorReply, status: 201 })
  add(@Me() me: Principal, @Param() { vesselId }: VesselParams, @Body() body: AddSensorBody) {
    return this.sensors.add(me, vesselId, body);
  }

  @Patch('sensors/:sensorId')
  @RequirePermission('rig:update')
  @ZodResponse({ type: SensorReply })
  update(@Me() me: Principal, @Param() { sensorId }: SensorParams, @Body() body: UpdateSensorBody) {
    return this.sensors.update(me, sensorId, body);
  }

  @Post('sensors/:sensorId/events')
  @RequirePermission('rig:update')
  @ZodResponse({ type: SensorReply, status: 201 })
  addEvent(@Me() me: Principal, @Param() { sensorId }: SensorParams, @Body() body: AddSensorEventBody) {
    return this.sensors.addEvent(me, sensorId, body);
  }
}
