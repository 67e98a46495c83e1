import { MikroORM } from '@mikro-orm/postgresql';
import type { FittedPartDto } from '@stayledger/shared/contracts/parts';
import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import { newId } from '../common/ids/new-id.js';
import { ormOptions } from '../database/mikro-orm.config.js';
import { seedReferenceData } from '../database/seed/reference-data.js';
import type { TestVessel } from '../testing/factories.js';
import { type Agent, TestApp } from '../testing/test-app.js';

jest.setTimeout(60_000);

let app: TestApp;
let vessel: TestVessel;
let rigger: Agent;
let owner: Agent;

beforeAll(async () => {
  app = await TestApp.create();
  const orm = await MikroORM.init(ormOptions(app.database.ownerUrl));
  try {
    await seedReferenceData(orm.em.fork(), app.clock.now());
  } finally {
    await orm.close(true);
  }
  vessel = await app.make.vessel({ buildYear: 2012 });
  rigger = await app.signIn(await app.make.userOn(vessel, 'rigger', { firmId: vessel.firmId }));
  owner = await app.signIn(await app.make.userOn(vessel, 'owner'));
});
afterAll(() => app?.close());

async function fit(part: Record<string, unknown>): Promise<FittedPartDto> {
  const position = await app.make.position(vessel);
  const { body } = await rigger.post(`/api/positions/${position.id}/parts`).send(part).expect(201);
  return body as FittedPartDto;
}

const STRAND = {
  constructionId: 'strand-1x19-316',
  diameterMm: 8,
  upperTerminal: 'swaged',
  lowerTerminal: 'swaged',
};

async function lifeOf(part: FittedPartDto): Promise<PartLifeDto> {
  return (await owner.get(`/api/parts/${part.id}/life`).expect(200)).body as PartLifeDto;
}

describe('a part nobody recorded', () => {
  it('is not assessed, keeps its calendar, and says what would give a date', async () => {
    const life = await lifeOf(await fit({ ...STRAND, fittedOn: '2024-05-10' }));
    expect(life.standing).toMatchObject({
      assessment: 'not-assessed',
      loadBasis: 'none',
      allowanceUsed: null,
      fatigueReplaceByOn: null,
      governingRule: 'calendar',
      due: 'in-date',
    });
    expect(life.wouldGiveDate.join(' ')).toContain('A load log with a sensor on this part');
    expect(life).toMatchObject({ days: [], worstDays: [], forecast: [], working: [], logs: [] });
    expect(life.details.length).toBeGreaterThan(3);
    expect(life.details.every(({ damage, allowanceUsed }) => damage === null && allowanceUsed === null)).toBe(
      true,
    );
    expect(life.headline).toContain('Not assessed');
    expect(life.assumptions.join(' ')).toContain('never replaces inspection by a competent person');
  });

  it('runs its calendar from the build year when nobody knows the day of fitting', async () => {
    const known = await lifeOf(await fit({ ...STRAND, fittedOn: '2012-01-01' }));
    const unknown = await lifeOf(await fit({ ...STRAND, fittedOn: null }));
    expect(unknown.standing.calendarReplaceByOn).toBe(known.standing.calendarReplaceByOn);
    expect(unknown.assumptions.join(' ')).toContain('The day of fitting is not known');
  });

  it('is kept by its calendar alone when it is fibre', async () => {
    const life = await lifeOf(
      await fit({ constructionId: 'fibre-hmpe', diameterMm: 11, fittedOn: '2025-01-01' }),
    );
    expect(life.standing).toMatchObject({ assessment: 'calendar-only', allowanceUsed: null });
    expect(life.details).toEqual([]);
    expect(life.headline).toContain('no fatigue is assessed');
  });
});

describe('the usage plan', () => {
  const path = () => `/api/vessels/${vessel.id}/usage-plan`;

  it('is stated by the owner, carries a version, and refuses what somebody else overtook', async () => {
    expect((await owner.get(path()).expect(200)).body).toEqual({ plan: null });
    const first = await owner.put(path()).send({ sailingHoursPerYear: 300, note: 'summer only' }).expect(200);
    expect(first.body.plan).toMatchObject({ sailingHoursPerYear: 300, note: 'summer only', version: 1 });
    const second = await rigger.put(path()).send({ sailingHoursPerYear: 320, version: 1 }).expect(200);
    expect(second.body.plan.version).toBe(2);
    const refused = await owner.put(path()).send({ sailingHoursPerYear: 310, version: 1 }).expect(409);
    expect(refused.body).toMatchObject({ code: 'version-conflict', current: { sailingHoursPerYear: 320 } });
    await owner.put(path()).send({ sailingHoursPerYear: 310 }).expect(409);
    await owner.put(path()).send({ sailingHoursPerYear: 9000, version: 2 }).expect(400);
    const events = await app.database.admin.query(
      `select count(*)::int as count from audit_event where action = 'usage-plan.stated' and vessel_id = $1`,
      [vessel.id],
    );
    expect(events.rows[0].count).toBe(2);
  });

  it('is stated once when two people state the first one at the same moment', async () => {
    const other = await app.make.vessel();
    const people = await Promise.all(
      (['owner', 'rigger'] as const).map(async (role) => app.signIn(await app.make.userOn(other, role))),
    );
    const replies = await Promise.all(
      people.map((person, i) =>
        person.put(`/api/vessels/${other.id}/usage-plan`).send({ sailingHoursPerYear: 100 + i }),
      ),
    );
    expect(replies.map(({ status }) => status).sort()).toEqual([200, 409]);
  });
});

describe('reach of lives and ledgers', () => {
  it('is asked for at every route', async () => {
    const part = await fit({ ...STRAND, fittedOn: '2024-05-10' });
    const stranger = await app.signIn(await app.make.member('rigger'));
    const insurer = await app.signIn(await app.make.userOn(vessel, 'insurer'));
    const plan = { sailingHoursPerYear: 1 };
    const routes = (partId: string, vesselId: string): ['get' | 'put', string, object?][] => [
      ['get', `/api/parts/${partId}/life`],
      ['get', `/api/parts/${partId}/ledger`],
      ['get', `/api/vessels/${vesselId}/usage-plan`],
      ['put', `/api/vessels/${vesselId}/usage-plan`, plan],
    ];
    const absent = routes(newId(), newId());
    const without = ({ body }: { body: object }) => ({ ...body, requestId: '' });
    for (const [i, [method, url, body]] of routes(part.id, vessel.id).entries()) {
      await app.agent()[method](url).send(body).expect(401);
      const foreign = await stranger[method](url).send(body).expect(404);
      expect(without(foreign)).toEqual(without(await stranger[method](absent[i][1]).send(body).expect(404)));
      await insurer[method](url).send(body).expect(403);
    }
  });
});
