import { can, type Permission, ROLES, type Role } from '@stayledger/shared/permissions/permissions';
import { openApiDocument } from '../common/http/openapi.js';
import { newId } from '../common/ids/new-id.js';
import { LOG_STORAGE, type LogStorage } from '../storage/log-storage.js';
import type { TestUser, TestVessel } from '../testing/factories.js';
import { TestApp, type Agent } from '../testing/test-app.js';
import { Readable } from 'node:stream';

// A request for each route, role and vessel, on whatever else the machine is doing.
jest.setTimeout(120_000);

/** Stands in every name of a vessel, part, log and firm that must not be seen. */
const SECRET = 'Unmentionable';
const BYTES = Buffer.from('time,load\n');
const TUS = { 'Tus-Resumable': '1.0.0' };

interface Route {
  path: string;
  access: string;
  hasSearch: boolean;
}
interface World {
  vessel: TestVessel;
  ids: Record<string, string>;
}

let app: TestApp;
let reads: Route[];
let own: World;
let foreign: World;
let lapsed: World;
const people = new Map<Role, { user: TestUser; agent: Agent }>();

beforeAll(async () => {
  app = await TestApp.create();
  reads = Object.entries(openApiDocument(app.nest).paths).flatMap(([path, { get }]) =>
    get
      ? [
          {
            path,
            access: (get as unknown as Record<string, string>)['x-access'],
            hasSearch: (get.parameters ?? []).some((one) => 'name' in one && one.name === 'q'),
          },
        ]
      : [],
  );
  own = await makeWorld('Reachable');
  foreign = await makeWorld(SECRET);
  lapsed = await makeWorld(SECRET);
  for (const role of ROLES) {
    const user = await app.make.userOn(own.vessel, role);
    if (role !== 'administrator') {
      await app.make.grant(lapsed.vessel, partyOf(user), role, { endsAt: new Date('2020-01-01T00:00:00Z') });
    }
    people.set(role, { user, agent: await app.signIn(user) });
  }
});
afterAll(() => app?.close());

const partyOf = ({ id, firmId }: TestUser) => (firmId === null ? `user:${id}` : `firm:${firmId}`);

async function makeWorld(word: string): Promise<World> {
  const firm = await app.make.firm({ name: `${word} ${newId()}` });
  const vessel = await app.make.vessel({ name: `${word} ${newId()}`, firmId: firm.id });
  const rigger = await app.make.member('rigger', { firmId: firm.id, name: `${word} rigger` });
  const agent = await app.signIn(rigger);
  const position = await app.make.position(vessel, { label: `${word} shroud` });
  const part = await agent
    .post(`/api/positions/${position.id}/parts`)
    .send({ constructionId: 'strand-1x19-316', diameterMm: 8, batch: `${word} batch` })
    .expect(201);
  const loadLogId = newId();
  const now = app.clock.now();
  await app.make.insert('load_log', {
    id: loadLogId,
    vessel_id: vessel.id,
    state: 'failed',
    file_name: `${word}.csv`,
    size_bytes: BYTES.length,
    received_bytes: BYTES.length,
    sha256: 'ab'.repeat(32),
    mapping: {
      delimiter: ',',
      decimalComma: false,
      time: { column: 'time', format: 'iso', naiveOffsetMinutes: 0 },
      channels: [{ column: `${word} load`, unit: 'kN', positionId: position.id }],
    },
    failure: { code: 'no-rows', message: `${word} has no rows.` },
    uploaded_by: rigger.id,
    created_at: now,
    updated_at: now,
  });
  const storage = app.nest.get<LogStorage>(LOG_STORAGE);
  const key = { vesselId: vessel.id, loadLogId };
  await storage.begin(key);
  await storage.append(key, 0, Readable.from([BYTES]));
  await storage.complete(key);
  const jobId = newId();
  await app.make.insert('job', {
    id: jobId,
    kind: 'count-load-log',
    subject_id: loadLogId,
    vessel_id: vessel.id,
    input_version: 1,
    state: 'failed',
    last_error: { code: 'no-rows', message: `${word} has no rows.` },
    created_at: now,
  });
  return {
    vessel,
    ids: { vesselId: vessel.id, positionId: position.id, partId: part.body.id, loadLogId, jobId },
  };
}

const isOfOneThing = ({ path }: Route) => path.includes('{');
/** Addresses whose ids this test has; others have their own tests beside their modules. */
const isKnown = ({ path }: Route) =>
  [...path.matchAll(/\{(\w+)\}/g)].every(([, name]) => name in own.ids) && /\{/.test(path);
const addressIn = (path: string, { ids }: Pick<World, 'ids'>) =>
  path.replace(/\{(\w+)\}/g, (_, name: string) => ids[name]);

/** What a text gives away of worlds out of reach: names, and ids of anything. */
function leaksIn(text: string): string[] {
  const ids = [foreign, lapsed].flatMap((world) => Object.values(world.ids));
  return [SECRET, ...ids].filter((word) => text.includes(word));
}

describe('lists, counts and searches', () => {
  it('hold nothing of vessels out of reach, for whoever may ask', async () => {
    const lists = reads.filter((route) => !isOfOneThing(route));
    expect(lists.length).toBeGreaterThan(5);
    for (const route of lists) {
      for (const [role, { agent }] of people) {
        // Administrators keep users, firms and jobs of the service; names of firms are theirs to see.
        if (role === 'administrator') continue;
        const queries = route.hasSearch ? ['', `?q=${SECRET}`, '?q=%25', `?q=${foreign.vessel.id}`] : [''];
        for (const query of queries) {
          const { status, text } = await agent.get(route.path + query);
          expect({ role, path: route.path + query, leaks: leaksIn(text) }).toMatchObject({ leaks: [] });
          expect(status).toBeLessThan(500);
        }
      }
    }
  });

  it('count what they list: the one vessel in reach', async () => {
    for (const role of ['rigger', 'surveyor', 'owner'] as const) {
      const { body } = await agentOf(role).get('/api/vessels').expect(200);
      expect(body.items.map(({ id }: { id: string }) => id)).toEqual([own.vessel.id]);
      expect(body.nextCursor).toBeNull();
    }
  });

  it('show administrators no vessel, part or file of anybody', async () => {
    for (const route of reads.filter((one) => !isOfOneThing(one))) {
      const { text } = await agentOf('administrator').get(route.path);
      for (const word of [foreign.vessel.name, `${SECRET} batch`, `${SECRET} shroud`, `${SECRET}.csv`]) {
        expect([route.path, text.includes(word)]).toEqual([route.path, false]);
      }
    }
  });
});

describe('everything of one vessel', () => {
  it('is 404 without a word of it when foreign, lapsed or absent', async () => {
    const routes = reads.filter(isKnown);
    expect(routes.length).toBeGreaterThan(12);
    const absent = { ids: Object.fromEntries(Object.keys(own.ids).map((name) => [name, newId()])) };
    for (const { path, access } of routes) {
      for (const [role, { agent }] of people) {
        const expected = can(role, access as Permission) ? 404 : 403;
        for (const world of [foreign, lapsed, absent]) {
          const { status, text } = await agent.get(addressIn(path, world));
          expect({ role, path, status, leaks: leaksIn(text) }).toEqual({
            role,
            path,
            status: expected,
            leaks: [],
          });
        }
      }
    }
  });

  it('opens for as long as it is granted and not a moment longer, to a firm and to a person', async () => {
    for (const role of ['rigger', 'surveyor', 'owner'] as const) {
      const { user, agent } = people.get(role) ?? {};
      if (!user || !agent) throw new Error(`no ${role}`);
      await app.make.grant(foreign.vessel, partyOf(user), role, { endsAt: new Date('2999-01-01T00:00:00Z') });
      const seen = async () => {
        const statuses = [];
        for (const { path, access } of reads.filter(isKnown)) {
          if (!can(role, access as Permission)) continue;
          statuses.push((await agent.get(addressIn(path, foreign))).status);
        }
        return new Set(statuses);
      };
      const listed = async () => (await agent.get('/api/vessels').expect(200)).body.items.length;
      expect(await seen()).toEqual(new Set([200]));
      expect(await listed()).toBe(2);
      await app.database.admin.query(
        `update vessel_access set ends_at = '2020-01-01' where vessel_id = $1 and party = $2`,
        [foreign.vessel.id, partyOf(user)],
      );
      expect(await seen()).toEqual(new Set([404]));
      expect(await listed()).toBe(1);
    }
  });

  it('gives its file to those in reach and to nobody else', async () => {
    for (const role of ['rigger', 'surveyor', 'owner'] as const) {
      const file = (world: World) =>
        agentOf(role).get(`/api/load-logs/${world.ids.loadLogId}/file`).buffer(true);
      expect(Buffer.from((await file(own).expect(200)).body)).toEqual(BYTES);
      for (const world of [foreign, lapsed]) {
        const refused = await file(world).expect(404);
        expect(refused.headers['content-disposition']).toBeUndefined();
      }
    }
    await agentOf('insurer').get(`/api/load-logs/${own.ids.loadLogId}/file`).expect(403);
    await app.agent().get(`/api/load-logs/${own.ids.loadLogId}/file`).expect(401);
  });

  it('takes no byte over the upload protocol, and tells foreign from absent by nothing', async () => {
    const agent = agentOf('rigger');
    for (const send of [
      (id: string) => agent.head(`/api/uploads/${id}`).set(TUS),
      (id: string) => agent.delete(`/api/uploads/${id}`).set(TUS),
      (id: string) =>
        agent
          .patch(`/api/uploads/${id}`)
          .set({ ...TUS, 'Upload-Offset': '0', 'Content-Type': 'application/offset+octet-stream' })
          .send(BYTES),
      (id: string) =>
        agent.post('/api/uploads').set({
          ...TUS,
          'Upload-Length': '10',
          'Upload-Metadata': `loadLogId ${Buffer.from(id).toString('base64')}`,
        }),
    ]) {
      const replies = [];
      for (const id of [newId(), foreign.ids.loadLogId, lapsed.ids.loadLogId]) {
        const { status, text } = await send(id);
        replies.push([status, (text ?? '').replace(/"requestId":"[^"]*"/, '')]);
      }
      expect(replies[0][0]).toBe(404);
      expect(replies[1]).toEqual(replies[0]);
      expect(replies[2]).toEqual(replies[0]);
    }
  });
});

function agentOf(role: Role): Agent {
  const found = people.get(role);
  if (!found) throw new Error(`no ${role}`);
  return found.agent;
}
