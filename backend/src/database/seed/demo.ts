import type { EntityManager } from '@mikro-orm/postgresql';
import type { ConstructionDto } from '@stayledger/shared/contracts/constructions';
import { addMonths } from '@stayledger/shared/fatigue/life/days';
import { positionKind } from '@stayledger/shared/rig/positions';
import { DEMO_PASSWORD, DEMO_SETTING, type DemoSetting } from '../../auth/demo.js';
import { hashPassword } from '../../auth/passwords.js';
import type { Clock } from '../../common/clock/clock.js';
import { newId } from '../../common/ids/new-id.js';
import { Construction } from '../../constructions/construction.entity.js';
import { Firm } from '../../firms/firm.entity.js';
import { Membership, type FIRM_ROLES } from '../../firms/membership.entity.js';
import { AccountService } from '../../ledger/account.service.js';
import { PartHistory } from '../../ledger/part-history.js';
import { PartDetailsService } from '../../life/part-details.service.js';
import { PartStandingService } from '../../life/part-standing.service.js';
import { UsagePlan } from '../../life/usage-plan.entity.js';
import { FittedPart } from '../../parts/fitted-part.entity.js';
import { areaOf, breakingLoadOf } from '../../parts/part-strength.js';
import { Position } from '../../rig/position.entity.js';
import { positionLabel } from '../../rig/position-label.js';
import { SensorEvent } from '../../sensors/sensor-event.entity.js';
import { Sensor } from '../../sensors/sensor.entity.js';
import { User } from '../../users/user.entity.js';
import { VesselAccess, type AccessRole } from '../../vessels/vessel-access.entity.js';
import { Vessel } from '../../vessels/vessel.entity.js';
import { inReach } from '../reach.js';
import { ServiceSetting } from '../service-setting.entity.js';
import { seedOwnReference } from './demo-reference.js';
import { seedSchedules } from './demo-schedules.js';
import {
  DEMO_FIRMS,
  DEMO_PEOPLE,
  DEMO_RIGGER,
  DEMO_VESSELS,
  type DemoPart,
  type DemoPosition,
  type DemoSensor,
  type DemoVessel,
} from './demo-scenario.js';

/** A grant to the demo's other firms runs this long from the first day. */
const GRANT_MONTHS = 24;

/**
 * Makes the demo in one transaction, once: null when anybody is registered already. The load logs come afterwards,
 * uploaded and counted by the running service like anybody's.
 */
export async function seedDemo(
  em: EntityManager,
  clock: Clock,
): Promise<{ vessels: number; users: number } | null> {
  const parties = [...DEMO_VESSELS.map(({ id }) => `vessel:${id}`), `firm:${DEMO_FIRMS.riggers.id}`];
  return inReach(em, { parties }, async (inner) => {
    if ((await inner.count(User)) > 0) return null;
    const firstDayOn = clock.todayIn(DEMO_VESSELS[0].zone);
    await seedPeople(inner, clock, firstDayOn);
    await seedOwnReference(inner, DEMO_FIRMS.riggers.id, clock.now());
    for (const vessel of DEMO_VESSELS) await seedVessel(inner, clock, vessel, firstDayOn);
    await seedSchedules(inner, {
      firmId: DEMO_FIRMS.riggers.id,
      riggerId: DEMO_RIGGER.id,
      vesselIds: DEMO_VESSELS.slice(0, 2).map(({ id }) => id),
      firstDayOn,
      now: clock.now(),
    });
    return { vessels: DEMO_VESSELS.length, users: DEMO_PEOPLE.length };
  });
}

async function seedPeople(em: EntityManager, clock: Clock, firstDayOn: string): Promise<void> {
  const now = clock.now();
  const stamps = { createdAt: now, updatedAt: now };
  for (const firm of Object.values(DEMO_FIRMS))
    em.persist(em.create(Firm, { ...firm, currency: 'NOK', ...stamps }));
  const passwordHash = await hashPassword(DEMO_PASSWORD);
  for (const { id, name, email, role, firm } of DEMO_PEOPLE) {
    em.persist(
      em.create(User, {
        id,
        name,
        email,
        passwordHash,
        preferences: {},
        active: true,
        sessionsValidFrom: now,
        ...stamps,
      }),
    );
    if (firm === null) continue;
    em.persist(
      em.create(Membership, {
        id: newId(),
        user: id,
        firm: DEMO_FIRMS[firm].id,
        role: role as (typeof FIRM_ROLES)[number],
        createdAt: now,
      }),
    );
  }
  const demo: DemoSetting = {
    firstDayOn,
    users: DEMO_PEOPLE.map(({ id, email, role, name }) => ({ id, email, role, name })),
  };
  em.persist(em.create(ServiceSetting, { key: DEMO_SETTING, value: demo, updatedAt: now }));
  await em.flush();
}

async function seedVessel(
  em: EntityManager,
  clock: Clock,
  demo: DemoVessel,
  firstDayOn: string,
): Promise<void> {
  const now = clock.now();
  const stamps = { createdAt: now, updatedAt: now };
  const { positions, sensors = [], plannedHoursPerYear, ownerId, sharedWithInsurer, ...fields } = demo;
  em.persist(em.create(Vessel, { ...fields, firm: DEMO_FIRMS.riggers.id, ...stamps }));
  await em.flush();

  const grant = (party: string, role: AccessRole, endsAt: Date | null) =>
    em.persist(
      em.create(VesselAccess, { id: newId(), vessel: demo.id, party, role, endsAt, createdAt: now }),
    );
  const grantEnd = new Date(`${addMonths(firstDayOn, GRANT_MONTHS)}T00:00:00Z`);
  grant(`firm:${DEMO_FIRMS.riggers.id}`, 'rigger', null);
  grant(`firm:${DEMO_FIRMS.surveyors.id}`, 'surveyor', grantEnd);
  if (sharedWithInsurer) grant(`firm:${DEMO_FIRMS.insurer.id}`, 'insurer', grantEnd);
  if (ownerId !== null) grant(`user:${ownerId}`, 'owner', null);
  if (plannedHoursPerYear !== undefined) {
    em.persist(
      em.create(UsagePlan, {
        id: newId(),
        vessel: demo.id,
        sailingHoursPerYear: plannedHoursPerYear,
        note: 'As last season.',
        statedBy: ownerId ?? DEMO_PEOPLE[1].id,
        ...stamps,
      }),
    );
  }
  await em.flush();
  for (const position of positions) await seedPosition(em, clock, demo, position, firstDayOn);
  for (const sensor of sensors) await seedSensor(em, clock, demo, sensor, firstDayOn);
}

async function seedSensor(
  em: EntityManager,
  clock: Clock,
  vessel: DemoVessel,
  sensor: DemoSensor,
  firstDayOn: string,
): Promise<void> {
  const now = clock.now();
  const id = newId();
  const { name, kind, fullScaleKn, errorPercent = null, zeroCheck, calibratedMonthsAgo } = sensor;
  em.persist(
    em.create(Sensor, {
      id,
      vessel: vessel.id,
      name,
      kind,
      position: vessel.positions[sensor.position].id,
      fullScaleKn,
      errorPercent,
      scale: null,
      inLine: [],
      placedOn: addMonths(firstDayOn, -sensor.placedMonthsAgo),
      removedOn: null,
      notes: '',
      createdAt: now,
      updatedAt: now,
    }),
  );
  await em.flush();
  const event = { vessel: vessel.id, sensor: id, note: '', recordedBy: DEMO_RIGGER.id, createdAt: now };
  if (calibratedMonthsAgo !== undefined) {
    const doneOn = addMonths(firstDayOn, -calibratedMonthsAgo);
    em.persist(em.create(SensorEvent, { ...event, id: newId(), kind: 'calibration', doneOn }));
  }
  if (zeroCheck) {
    const { monthsAgo, readingKn, rigState } = zeroCheck;
    const doneOn = addMonths(firstDayOn, -monthsAgo);
    em.persist(
      em.create(SensorEvent, { ...event, id: newId(), kind: 'zero-check', doneOn, readingKn, rigState }),
    );
  }
  await em.flush();
}

async function seedPosition(
  em: EntityManager,
  clock: Clock,
  vessel: DemoVessel,
  { id, kind, side, mast, part }: DemoPosition,
  firstDayOn: string,
): Promise<void> {
  const known = positionKind(kind);
  if (!known) throw new Error(`The demo names a kind of place that does not exist: ${kind}`);
  const now = clock.now();
  const stamps = { createdAt: now, updatedAt: now };
  const label = positionLabel(known.name, side, mast);
  em.persist(
    em.create(Position, {
      id,
      vessel: vessel.id,
      kind,
      side,
      mast,
      label,
      sortOrder: known.order,
      ...stamps,
    }),
  );
  await em.flush();
  if (part === null) return;

  const fitted = em.create(FittedPart, {
    id: newId(),
    vessel: vessel.id,
    position: id,
    ...(await describe(em, part)),
    fittedOn: part.fittedMonthsAgo === undefined ? null : addMonths(firstDayOn, -part.fittedMonthsAgo),
    ...stamps,
  });
  await em.persist(fitted).flush();
  await new PartDetailsService(clock).describe(em, fitted);
  const history = new PartHistory();
  await new PartStandingService(new AccountService(history, clock), history, clock).recompute(em, fitted.id);
}

async function describe(em: EntityManager, part: DemoPart) {
  const [stored] = await em.find(
    Construction,
    { id: part.constructionId },
    { orderBy: { version: 'desc' }, limit: 1 },
  );
  const construction = stored?.data as ConstructionDto | undefined;
  const strength = construction && breakingLoadOf(construction, part.diameterMm, part.certificateKn ?? null);
  if (!construction || !strength)
    throw new Error(`The reference data lack ${part.constructionId} ${part.diameterMm} mm`);
  return {
    construction: [construction.id, construction.version] as [string, number],
    diameterMm: part.diameterMm,
    breakingLoadKn: strength.breakingLoadKn,
    breakingLoadSource: strength.source,
    metallicAreaMm2: areaOf(construction, part.diameterMm),
    lengthM: part.lengthM,
    upperTerminal: part.terminal,
    lowerTerminal: part.terminal,
    threadSize: part.threadSize ?? null,
    pinDiameterMm: part.pinDiameterMm ?? null,
    batch: '',
    certificate: '',
    notes: '',
  };
}
