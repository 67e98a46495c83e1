import { EntityManager, LockMode } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { LoadBasesDto } from '@stayledger/shared/contracts/rig';
import type {
  addSensorEventSchema,
  addSensorSchema,
  SensorDto,
  SensorListDto,
  UpdateSensorInput,
} from '@stayledger/shared/contracts/sensors';
import { loadBases } from '@stayledger/shared/rig/load-basis';
import { sensorWants } from '@stayledger/shared/rig/sensor-wants';
import type { z } from 'zod';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { InvalidRequestError, NotFoundError, VersionConflictError } from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { Position } from '../rig/position.entity.js';
import { User } from '../users/user.entity.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { SensorEvent } from './sensor-event.entity.js';
import { Sensor } from './sensor.entity.js';

type AddInput = z.output<typeof addSensorSchema>;
type EventInput = z.output<typeof addSensorEventSchema>;

/** What each kind of sensor needs to turn its reading into a force; pins and links need nothing. */
const SCALE_OF_KIND = {
  pin: null,
  link: null,
  'ram-pressure': 'ram-area',
  strain: 'axial-stiffness',
  raw: 'two-points',
} as const;

/** The sensors of a vessel, what was done to them, and what they tell of the loads of each place. */
@Injectable()
export class SensorsService {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
    private readonly reach: VesselReach,
    private readonly audit: AuditService,
  ) {}

  async list(me: Principal, vesselId: string): Promise<SensorListDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'vessels:read');
    const sensors = await this.em.find(
      Sensor,
      { vessel: vessel.id },
      { orderBy: { name: 'asc', id: 'asc' } },
    );
    return { items: await this.toDtos(sensors, vessel) };
  }

  async add(me: Principal, vesselId: string, input: AddInput): Promise<SensorDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'rig:update');
    await this.em.execute('select 1 from vessel where id = ? for update', [vessel.id]);
    await this.check(vessel, null, input);
    const now = this.clock.now();
    const { positionId, ...fields } = input;
    const sensor = this.em.create(Sensor, {
      id: newId(),
      vessel: vessel.id,
      position: positionId,
      createdAt: now,
      updatedAt: now,
      ...fields,
    });
    await this.em.persist(sensor).flush();
    await this.record(me, vessel, sensor, 'sensor.added', { kind: sensor.kind, name: sensor.name });
    return this.toDto(sensor, vessel);
  }

  async update(
    me: Principal,
    sensorId: string,
    { version, positionId, ...changes }: UpdateSensorInput,
  ): Promise<SensorDto> {
    const vessel = await this.vesselOf(me, sensorId);
    await this.em.execute('select 1 from vessel where id = ? for update', [vessel.id]);
    const sensor = await this.em.findOneOrFail(
      Sensor,
      { id: sensorId },
      { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
    );
    if (sensor.version !== version) throw new VersionConflictError(await this.toDto(sensor, vessel));
    const position = positionId === undefined ? sensor.position : positionId;
    await this.check(vessel, sensor.id, { ...sensor, ...changes, positionId: position });
    this.em.assign(sensor, { ...changes, position, updatedAt: this.clock.now() });
    await this.em.flush();
    await this.record(me, vessel, sensor, 'sensor.updated', { fields: Object.keys(changes) });
    return this.toDto(sensor, vessel);
  }

  async addEvent(me: Principal, sensorId: string, input: EventInput): Promise<SensorDto> {
    const vessel = await this.vesselOf(me, sensorId);
    const sensor = await this.em.findOneOrFail(Sensor, { id: sensorId });
    checkEvent(input, this.clock.todayIn(vessel.zone));
    this.em.persist(
      this.em.create(SensorEvent, {
        id: newId(),
        vessel: vessel.id,
        sensor: sensor.id,
        recordedBy: me.userId,
        createdAt: this.clock.now(),
        ...input,
      }),
    );
    await this.em.flush();
    await this.record(me, vessel, sensor, 'sensor.event-recorded', {
      kind: input.kind,
      doneOn: input.doneOn,
    });
    return this.toDto(sensor, vessel);
  }

  async loadBases(me: Principal, vesselId: string): Promise<LoadBasesDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'vessels:read');
    const positions = await this.em.find(
      Position,
      { vessel: vessel.id, archivedAt: null },
      { orderBy: { sortOrder: 'asc', label: 'asc', id: 'asc' } },
    );
    const sensors = await this.em.find(
      Sensor,
      { vessel: vessel.id },
      { orderBy: { name: 'asc', id: 'asc' } },
    );
    const todayOn = this.clock.todayIn(vessel.zone);
    const labels = new Map(positions.map(({ id, label }) => [id, label]));
    const placed = sensors.flatMap(({ name, position, inLine, placedOn, removedOn }) =>
      position !== null &&
      labels.has(position) &&
      (placedOn === null || placedOn <= todayOn) &&
      (removedOn === null || removedOn > todayOn)
        ? [{ name, positionId: position, inLine }]
        : [],
    );
    return {
      items: loadBases(positions, placed).map(({ positionId, basis, throughPositionId, words, improve }) => ({
        positionId,
        basis,
        throughLabel: throughPositionId === null ? null : (labels.get(throughPositionId) ?? null),
        words,
        improve,
      })),
    };
  }

  private async vesselOf(me: Principal, sensorId: string): Promise<Vessel> {
    const sensor = await this.em.findOne(Sensor, { id: sensorId });
    if (!sensor) throw new NotFoundError();
    return this.reach.findOrFail(me, sensor.vessel, 'rig:update');
  }

  private async check(vessel: Vessel, sensorId: string | null, input: AddInput): Promise<void> {
    const errors: Record<string, string[]> = {};
    const wanted = SCALE_OF_KIND[input.kind];
    if (input.scale !== null && input.scale.by !== wanted) {
      errors.scale = [wanted === null ? 'This kind of sensor reads in force already.' : SCALE_WORDS[wanted]];
    }
    if (input.scale?.by === 'two-points' && input.scale.lowRaw === input.scale.highRaw) {
      errors.scale = ['The two points have the same raw reading.'];
    }
    if (input.placedOn !== null && input.removedOn !== null && input.removedOn < input.placedOn) {
      errors.removedOn = [`It was placed on ${input.placedOn}; give that day or a later one.`];
    }
    const places = [...new Set([...(input.positionId === null ? [] : [input.positionId]), ...input.inLine])];
    const known = await this.em.count(Position, { id: { $in: places }, vessel: vessel.id, archivedAt: null });
    if (known < places.length) errors.positionId = ['Choose a place of this rig.'];
    if (input.positionId !== null && input.inLine.includes(input.positionId)) {
      errors.inLine = ['The measured place itself need not be named.'];
    }
    const namesake = await this.em.findOne(Sensor, { vessel: vessel.id, name: input.name, removedOn: null });
    if (namesake && namesake.id !== sensorId && input.removedOn === null) {
      errors.name = ['Another sensor of this vessel has that name.'];
    }
    if (Object.keys(errors).length > 0) throw new InvalidRequestError(errors);
  }

  private async record(
    me: Principal,
    vessel: Vessel,
    sensor: Sensor,
    action: string,
    data: Record<string, unknown>,
  ): Promise<void> {
    await this.audit.record(this.em, {
      action,
      subjectKind: 'sensor',
      subjectId: sensor.id,
      userId: me.userId,
      vesselId: vessel.id,
      data,
    });
  }

  private async toDto(sensor: Sensor, vessel: Vessel): Promise<SensorDto> {
    return (await this.toDtos([sensor], vessel))[0];
  }

  private async toDtos(sensors: readonly Sensor[], vessel: Vessel): Promise<SensorDto[]> {
    const positions = await this.em.find(Position, { vessel: vessel.id });
    const events = await this.em.find(
      SensorEvent,
      { sensor: { $in: sensors.map(({ id }) => id) } },
      { orderBy: { doneOn: 'desc', createdAt: 'desc', id: 'desc' } },
    );
    const people = await this.em.find(User, { id: { $in: events.map(({ recordedBy }) => recordedBy) } });
    const nameOf = new Map(people.map(({ id, name }) => [id, name]));
    const todayOn = this.clock.todayIn(vessel.zone);
    return sensors.map((sensor) => {
      const own = events.filter((event) => event.sensor === sensor.id);
      return {
        id: sensor.id,
        vesselId: vessel.id,
        name: sensor.name,
        kind: sensor.kind,
        positionId: sensor.position,
        positionLabel: positions.find(({ id }) => id === sensor.position)?.label ?? null,
        fullScaleKn: sensor.fullScaleKn,
        errorPercent: sensor.errorPercent,
        scale: sensor.scale,
        inLine: sensor.inLine,
        placedOn: sensor.placedOn,
        removedOn: sensor.removedOn,
        notes: sensor.notes,
        events: own.map((event) => ({
          id: event.id,
          kind: event.kind,
          doneOn: event.doneOn,
          readingKn: event.readingKn,
          rigState: event.rigState,
          statedTensionKn: event.statedTensionKn,
          batteryHours: event.batteryHours,
          note: event.note,
          recordedByName: nameOf.get(event.recordedBy) ?? 'Somebody no longer listed',
          createdAt: event.createdAt.toISOString(),
        })),
        wants: sensorWants({ ...sensor, events: own, todayOn }),
        version: sensor.version,
      };
    });
  }
}

const SCALE_WORDS = {
  'ram-area': 'A ram needs the area of its piston.',
  'axial-stiffness': 'A strain gauge needs the stiffness of what it is bonded to.',
  'two-points': 'A raw signal needs two points.',
} as const;

function checkEvent(input: EventInput, todayOn: string): void {
  const errors: Record<string, string[]> = {};
  if (input.doneOn > todayOn) errors.doneOn = ['This day is still to come.'];
  if (input.kind === 'zero-check') {
    if (input.readingKn === null) errors.readingKn = ['Enter what the sensor showed.'];
    if (input.rigState === null) errors.rigState = ['Say how the rig stood, or that nobody noted it.'];
  }
  if (input.kind === 'battery' && input.batteryHours === null) {
    errors.batteryHours = ['Enter the hours the new battery is good for.'];
  }
  if (Object.keys(errors).length > 0) throw new InvalidRequestError(errors);
}
