import { Controller, Get } from '@nestjs/common';
import {
  can,
  PERMISSIONS,
  ROLES,
  type Permission,
  type Role,
} from '@stayledger/shared/permissions/permissions';
import { openApiDocument } from '../common/http/openapi.js';
import { newId } from '../common/ids/new-id.js';
import type { TestUser, TestVessel } from '../testing/factories.js';
import { TestApp, type Agent } from '../testing/test-app.js';

/** Open without signing in, and nothing else is. */
const PUBLIC_ROUTES = [
  'get /api/auth/demo-sign-ins',
  'get /api/auth/session',
  'get /api/health',
  'post /api/auth/sign-in',
];
/** Need a sign-in and no permission: they concern only whoever asks. */
const SIGNED_IN_ROUTES = ['post /api/auth/sign-out'];

@Controller('forgotten')
class ForgottenController {
  @Get()
  read() {
    return { secret: true };
  }
}

interface Route {
  key: string;
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  path: string;
  access: string;
  hasBody: boolean;
}

/** One vessel and everything of hers that has an address. */
interface World {
  vessel: TestVessel;
  ids: Record<string, string>;
}

let app: TestApp;
let routes: Route[];
let own: World;
let foreign: World;
let lapsed: World;
const people = new Map<Role, { user: TestUser; agent: Agent }>();

beforeAll(async () => {
  app = await TestApp.create({ imports: [{ module: class Extra {}, controllers: [ForgottenController] }] });
  routes = Object.entries(openApiDocument(app.nest).paths).flatMap(([path, operations]) =>
    Object.entries(operations).map(([method, operation]) => ({
      key: `${method} ${path}`,
      method: method as Route['method'],
      path,
      access: (operation as Record<string, string>)['x-access'],
      hasBody: 'requestBody' in operation,
    })),
  );
  own = await makeWorld();
  foreign = await makeWorld();
  lapsed = await makeWorld();
  for (const role of ROLES) {
    const user = await app.make.userOn(own.vessel, role);
    if (role !== 'administrator') {
      const party = user.firmId === null ? `user:${user.id}` : `firm:${user.firmId}`;
      await app.make.grant(lapsed.vessel, party, role, { endsAt: new Date('2020-01-01T00:00:00Z') });
    }
    people.set(role, { user, agent: await app.signIn(user) });
  }
}, 30_000);
afterAll(() => app?.close());

async function makeWorld(): Promise<World> {
  const vessel = await app.make.vessel({ name: `Unmentionable ${newId()}` });
  const rigger = await app.make.member('rigger', { firmId: vessel.firmId });
  const agent = await app.signIn(rigger);
  const held = await app.make.position(vessel, { label: 'Cap shroud, port' });
  const free = await app.make.position(vessel, { label: 'Cap shroud, starboard', side: 'starboard' });
  const part = await agent.post(`/api/positions/${held.id}/parts`).send(FIT).expect(201);
  const loadLogId = newId();
  const jobId = newId();
  const now = app.clock.now();
  await app.make.insert('load_log', {
    id: loadLogId,
    vessel_id: vessel.id,
    state: 'failed',
    file_name: 'Unmentionable.csv',
    size_bytes: 10,
    mapping: mappingTo(held.id),
    failure: { code: 'empty', message: 'The file is empty.' },
    uploaded_by: rigger.id,
    created_at: now,
    updated_at: now,
  });
  await app.make.insert('job', {
    id: jobId,
    kind: 'count-load-log',
    subject_id: loadLogId,
    vessel_id: vessel.id,
    input_version: 1,
    state: 'failed',
    created_at: now,
  });
  const sensor = await agent
    .post(`/api/vessels/${vessel.id}/sensors`)
    .send({ name: 'Unmentionable pin', kind: 'pin' })
    .expect(201);
  return {
    vessel,
    ids: {
      sensorId: sensor.body.id,
      vesselId: vessel.id,
      positionId: free.id,
      partId: part.body.id,
      loadLogId,
      jobId,
      detailKey: 'free-length',
      // Of the product, the same in every world.
      curveId: 'en-1993-1-11-150',
      constructionId: 'strand-1x19-316',
    },
  };
}

const GEOMETRY = {
  deckLengthM: 10,
  beamM: 3,
  bowspritTip: null,
  masts: [
    {
      key: 'main',
      footAftM: 4,
      footUpM: 0,
      heightM: 12,
      houndsHeightM: 12,
      rakeDegrees: 0,
      spreaders: [],
      stayed: true,
    },
  ],
};
const FIT = { constructionId: 'strand-1x19-316', diameterMm: 8 };
const CHOICE = { curve: null, articulation: null, designFatigueFactor: 5 };
const mappingTo = (positionId: string) => ({
  delimiter: ',',
  decimalComma: false,
  time: { column: 'time', format: 'iso', naiveOffsetMinutes: 0 },
  channels: [{ column: 'load', unit: 'kN', positionId }],
});

/** A body each route accepts, so that the answer is about reach and not about the body. */
const BODIES: Record<string, (world: World) => object> = {
  'post /api/vessels/{vesselId}/position-pairs': () => ({ kind: 'lower' }),
  'post /api/vessels/{vesselId}/rig/template': () => ({ template: 'masthead-sloop' }),
  'put /api/vessels/{vesselId}/rig/geometry': () => ({ version: null, geometry: GEOMETRY }),
  'post /api/vessels/{vesselId}/rig/csv': () => ({ csv: 'place,side', apply: false }),
  'post /api/vessels/{vesselId}/sisters': () => ({ name: newId(), withParts: false }),
  'post /api/vessels/{vesselId}/sensors': () => ({ name: newId(), kind: 'pin' }),
  'patch /api/sensors/{sensorId}': () => ({ version: 1, notes: 'Seen' }),
  'post /api/sensors/{sensorId}/events': () => ({ kind: 'calibration', doneOn: '2027-06-01' }),
  'post /api/vessels/{vesselId}/rerig-schedule/plans': () => ({}),
  'put /api/vessels/{vesselId}/rerig-schedule/settings': () => ({ horizonYears: 5, absences: [] }),
  'post /api/vessels/{vesselId}/rerig-schedule/undo': () => ({ version: 1 }),
  'post /api/vessels/{vesselId}/rerig-schedule/state': () => ({ version: 1, state: 'proposed' }),
  'post /api/vessels/{vesselId}/rerig-schedule/answer': () => ({ version: 1, answer: 'accept' }),
  'put /api/vessels/{vesselId}/usage-plan': () => ({ sailingHoursPerYear: 400 }),
  'post /api/vessels/{vesselId}/load-logs': ({ ids }) => ({
    fileName: 'log.csv',
    sizeBytes: 100,
    mapping: mappingTo(ids.positionId),
  }),
  'post /api/load-logs/{loadLogId}/recount': ({ ids }) => ({
    version: 1,
    mapping: mappingTo(ids.positionId),
  }),
  'post /api/load-logs/{loadLogId}/post': () => ({ version: 1 }),
  'post /api/load-logs/{loadLogId}/set-aside': () => ({ version: 1, reason: 'A test' }),
  'post /api/load-logs/{loadLogId}/reverse': () => ({ version: 1, reason: 'A test' }),
  'post /api/positions/{positionId}/parts': () => FIT,
  'patch /api/parts/{partId}': () => ({ version: 1, notes: 'Seen' }),
  'post /api/parts/{partId}/detail-choices/{detailKey}/preview': () => CHOICE,
  'put /api/parts/{partId}/detail-choices/{detailKey}': () => ({ ...CHOICE, evidence: 'A test' }),
  'post /api/parts/{partId}/remove': () => ({ version: 1, removedOn: '2027-06-30', reason: 'A test' }),
  'post /api/vessels/{vesselId}/positions': () => ({ kind: 'backstay', side: 'centre', label: newId() }),
  'patch /api/positions/{positionId}': () => ({ version: 1, mast: 'mizzen' }),
  'patch /api/vessels/{vesselId}': () => ({ version: 1, notes: 'Seen' }),
};

const aboutOneVessel = () =>
  routes.filter(({ path }) => /\{(vessel|position|part|sensor|loadLog|job)Id\}/.test(path));

const addressIn = (path: string, ids: Record<string, string>): string =>
  path.replace(/\{(\w+)\}/g, (_, name: string) => ids[name] ?? 'no-such-parameter');

async function ask(
  agent: Agent,
  route: Route,
  world: World,
): Promise<{ status: number; body: object; text: string }> {
  const request = agent[route.method](addressIn(route.path, world.ids));
  const reply = await (route.hasBody ? request.send(BODIES[route.key](world)) : request);
  return { status: reply.status, body: reply.body as object, text: reply.text ?? '' };
}

describe('every route', () => {
  it('says who may use it', () => {
    const known = new Set<string>([...PERMISSIONS, 'public', 'signed-in']);
    const silent = routes.filter(({ access }) => !known.has(access)).map(({ key }) => key);
    expect(silent).toEqual(['get /api/forgotten']);
    const having = (access: string) =>
      routes.flatMap((route) => (route.access === access ? [route.key] : [])).sort();
    expect(having('public')).toEqual(PUBLIC_ROUTES);
    expect(having('signed-in')).toEqual(SIGNED_IN_ROUTES);
    expect(routes.length).toBeGreaterThan(35);
  });

  it('stays shut where it says nothing', async () => {
    await app.agent().get('/api/forgotten').expect(401);
    for (const { agent } of people.values()) {
      expect((await agent.get('/api/forgotten').expect(403)).body.code).toBe('forbidden');
    }
  });

  it('asks signed-out people to sign in, unless it is public', async () => {
    for (const route of routes.filter(({ key }) => !PUBLIC_ROUTES.includes(key))) {
      const reply = await app.agent()[route.method](addressIn(route.path, own.ids));
      expect([route.key, reply.status, reply.body.code]).toEqual([route.key, 401, 'signed-out']);
    }
  });

  it('refuses whoever lacks its permission, whether the thing exists or not', async () => {
    const absent: World = { ...own, ids: absentIds() };
    for (const route of routes.filter(({ access }) => (PERMISSIONS as readonly string[]).includes(access))) {
      for (const [role, { agent }] of people) {
        if (can(role, route.access as Permission)) continue;
        for (const world of [own, foreign, absent]) {
          const reply = await agent[route.method](addressIn(route.path, world.ids));
          expect([role, route.key, reply.status, reply.body.code]).toEqual([
            role,
            route.key,
            403,
            'forbidden',
          ]);
        }
      }
    }
  }, 60_000);
});

function absentIds(): Record<string, string> {
  return Object.fromEntries(Object.keys(own.ids).map((name) => [name, newId()]));
}

describe('every route about one vessel', () => {
  it('has a body for this test where it takes one', () => {
    const missing = aboutOneVessel().filter(({ key, hasBody }) => hasBody && !(key in BODIES));
    expect(missing.map(({ key }) => key)).toEqual([]);
    expect(aboutOneVessel().length).toBeGreaterThan(20);
  });

  it('answers foreign, lapsed and absent alike, to everybody who has the permission', async () => {
    const absent: World = { ...own, ids: absentIds() };
    const before = await footprint();
    let asked = 0;
    for (const route of aboutOneVessel()) {
      for (const [role, { agent }] of people) {
        if (!can(role, route.access as Permission)) continue;
        const replies = [];
        for (const world of [absent, foreign, lapsed]) {
          const { status, body, text } = await ask(agent, route, world);
          expect(text).not.toContain('Unmentionable');
          replies.push({ role, route: route.key, status, body: { ...body, requestId: '' } });
        }
        expect(replies[0]).toMatchObject({ status: 404, body: { code: 'not-found' } });
        expect(replies[1]).toEqual(replies[0]);
        expect(replies[2]).toEqual(replies[0]);
        asked += 1;
      }
    }
    expect(asked).toBeGreaterThan(50);
    expect(await footprint()).toEqual(before);
  }, 60_000);

  it('opens to those who reach the vessel with the permission, and to no other role', async () => {
    for (const route of aboutOneVessel()) {
      for (const [role, { agent }] of people) {
        const { status, body } = await ask(agent, route, own);
        const allowed = can(role, route.access as Permission);
        const seen = { role, route: route.key, status, body };
        if (allowed) expect([200, 201, 202, 204, 400, 409]).toContain(seen.status);
        else expect(seen).toMatchObject({ status: 403 });
        // Reading what is there must work; a change may meet the one before it.
        const fileIsThere = route.key !== 'get /api/load-logs/{loadLogId}/file';
        if (allowed && route.method === 'get' && fileIsThere) expect(seen).toMatchObject({ status: 200 });
      }
    }
  }, 60_000);

  /** What a request out of reach could have changed. */
  async function footprint(): Promise<unknown> {
    const ids = [foreign.vessel.id, lapsed.vessel.id];
    const tables = [
      'vessel',
      'position',
      'fitted_part',
      'part_detail',
      'load_log',
      'usage_plan',
      'rerig_schedule',
      'rerig_request',
      'audit_event',
    ];
    const counts = await Promise.all(
      tables.map((table) =>
        app.database.admin.query(
          `select md5(coalesce(string_agg(t::text, '|' order by t::text), '')) as hash from ${table} t
            where ${table === 'vessel' ? 'id' : 'vessel_id'} = any ($1)`,
          [ids],
        ),
      ),
    );
    return counts.map(({ rows }) => rows);
  }
});

describe('ids that are none', () => {
  it('are refused before anybody looks for them', async () => {
    const { agent } = people.get('rigger') ?? {};
    if (!agent) throw new Error('no rigger');
    for (const route of aboutOneVessel().filter(({ method }) => method === 'get')) {
      const nonsense = Object.fromEntries(Object.keys(own.ids).map((name) => [name, "1'--"]));
      const reply = await agent.get(addressIn(route.path, nonsense).replaceAll("'", '%27'));
      expect([route.key, reply.status, reply.body.code]).toEqual([route.key, 400, 'invalid-request']);
    }
  });
});
