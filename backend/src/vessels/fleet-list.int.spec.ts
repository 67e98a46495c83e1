import { newId } from '../common/ids/new-id.js';
import { TestApp, type Agent } from '../testing/test-app.js';

/** Today is 2027-07-01 on the test's clock. */
const OVERDUE = '2027-06-30';
const TODAY = '2027-07-01';
const WITHIN_A_YEAR = '2028-07-01';
const LATER = '2028-07-02';

let app: TestApp;
let agent: Agent;
let firmId: string;
let userId: string;

beforeAll(async () => {
  app = await TestApp.create();
});
afterAll(() => app?.close());
beforeEach(async () => {
  const rigger = await app.make.member('rigger');
  firmId = rigger.firmId;
  userId = rigger.id;
  agent = await app.signIn(rigger);
});

interface Standing {
  replaceByOn?: string | null;
  assessment?: 'assessed' | 'not-assessed' | 'calendar-only';
  allowanceUsed?: number | null;
  removed?: boolean;
}

async function vesselWith(
  name: string,
  standings: Standing[],
  override: { zone?: string } = {},
): Promise<string> {
  const vessel = await app.make.vessel({ firmId, name, ...override });
  for (const standing of standings) await addPart(vessel.id, standing);
  return vessel.id;
}

async function addPart(vesselId: string, standing: Standing): Promise<string> {
  const position = await app.make.position({ id: vesselId });
  const id = newId();
  const now = app.clock.now();
  await app.make.insert('fitted_part', {
    id,
    vessel_id: vesselId,
    position_id: position.id,
    construction_id: 'strand-1x19-316',
    construction_version: 1,
    diameter_mm: 8,
    breaking_load_kn: 50,
    breaking_load_source: 'table',
    metallic_area_mm2: 38,
    upper_terminal: 'unknown',
    lower_terminal: 'unknown',
    removed_on: standing.removed ? '2027-01-01' : null,
    created_at: now,
    updated_at: now,
  });
  const replaceByOn = standing.replaceByOn ?? null;
  await app.make.insert('part_standing', {
    fitted_part_id: id,
    vessel_id: vesselId,
    assessment: standing.assessment ?? 'assessed',
    load_basis: 'measured',
    allowance_used: standing.allowanceUsed ?? null,
    replace_by_on: replaceByOn,
    governing_rule: replaceByOn === null ? null : 'calendar',
    standing: {},
    computed_on: TODAY,
    updated_at: now,
  });
  return id;
}

async function addLog(
  vesselId: string,
  state: string,
  toAt: string | null,
  hours: number | null,
): Promise<void> {
  await app.make.insert('load_log', {
    id: newId(),
    vessel_id: vesselId,
    state,
    file_name: 'log.csv',
    size_bytes: 1,
    mapping: {},
    to_at: toAt,
    logged_hours: hours,
    sha256: newId(),
    uploaded_by: userId,
    created_at: app.clock.now(),
    updated_at: app.clock.now(),
  });
}

const names = async (query = '', tab = agent): Promise<string[]> =>
  (await tab.get(`/api/vessels${query}`).expect(200)).body.items.map(({ name }: { name: string }) => name);

describe('the fleet list', () => {
  it('counts what is overdue, due and unknown, and names the part whose date comes first', async () => {
    await vesselWith('Alke', [
      { replaceByOn: WITHIN_A_YEAR, assessment: 'assessed', allowanceUsed: 0.4 },
      { replaceByOn: OVERDUE, assessment: 'calendar-only' },
      { replaceByOn: LATER, assessment: 'assessed', allowanceUsed: 0.1 },
      { assessment: 'not-assessed' },
      { replaceByOn: '2020-01-01', removed: true },
    ]);
    const { body } = await agent.get('/api/vessels').expect(200);
    expect(body.items).toHaveLength(1);
    expect(body.items[0].counts).toEqual({
      parts: 4,
      overdue: 1,
      due: 1,
      assessed: 2,
      notAssessed: 1,
      calendarOnly: 1,
      logsWaiting: 0,
    });
    expect(body.items[0].governing).toMatchObject({ replaceByOn: OVERDUE, due: 'overdue', rule: 'calendar' });
  });

  it('calls a date due from a year before until it is over, on the days of her own zone', async () => {
    const states = new Map<string, string>();
    for (const on of [OVERDUE, TODAY, WITHIN_A_YEAR, LATER]) await vesselWith(on, [{ replaceByOn: on }]);
    // At noon UTC it is already 2 July on Kiritimati (UTC+14).
    await vesselWith('far east', [{ replaceByOn: TODAY }], { zone: 'Pacific/Kiritimati' });
    const { body } = await agent.get('/api/vessels').expect(200);
    for (const { name, governing } of body.items) states.set(name, governing.due);
    expect(Object.fromEntries(states)).toEqual({
      [OVERDUE]: 'overdue',
      [TODAY]: 'due',
      [WITHIN_A_YEAR]: 'due',
      [LATER]: 'in-date',
      'far east': 'overdue',
    });
  });

  it('calls a used-up allowance overdue whatever its date', async () => {
    await vesselWith('Spent', [{ replaceByOn: LATER, allowanceUsed: 1.2 }]);
    const { body } = await agent.get('/api/vessels?filter=overdue').expect(200);
    expect(body.items[0]).toMatchObject({
      name: 'Spent',
      governing: { due: 'overdue' },
      counts: { overdue: 1 },
    });
  });

  it('adds logs: waiting, hours posted, and when the last one ended', async () => {
    const id = await vesselWith('Logged', []);
    await addLog(id, 'posted', '2027-05-01T10:00:00Z', 12.5);
    await addLog(id, 'posted', '2027-06-01T10:00:00Z', 7.5);
    await addLog(id, 'counted', '2027-06-15T08:30:00Z', 3);
    await addLog(id, 'set-aside', '2027-06-20T08:30:00Z', 100);
    await addLog(id, 'receiving', null, null);
    const { body } = await agent.get('/api/vessels?filter=waiting').expect(200);
    expect(body.items[0]).toMatchObject({
      loggedHours: 20,
      lastLogAt: '2027-06-15T08:30:00.000Z',
      counts: { logsWaiting: 1 },
    });
  });

  it('sorts by due date, name and last log', async () => {
    const late = await vesselWith('alpha', [{ replaceByOn: LATER }]);
    await vesselWith('Bravo', [{ replaceByOn: OVERDUE }]);
    const none = await vesselWith('Charlie', []);
    await addLog(none, 'counted', '2027-06-15T08:30:00Z', 3);
    await addLog(late, 'posted', '2027-06-01T08:30:00Z', 3);
    expect(await names()).toEqual(['Bravo', 'alpha', 'Charlie']);
    expect(await names('?sort=name')).toEqual(['alpha', 'Bravo', 'Charlie']);
    expect(await names('?sort=last-log')).toEqual(['Charlie', 'alpha', 'Bravo']);
  });

  it.each(['due', 'name', 'last-log'])(
    'pages through ties and gaps without loss or repetition (%s)',
    async (sort) => {
      for (let n = 0; n < 7; n++) {
        const id = await vesselWith(
          n < 4 ? 'Same name' : `Name ${n}`,
          n % 3 === 0 ? [] : [{ replaceByOn: LATER }],
        );
        if (n % 2 === 0) await addLog(id, 'counted', `2027-06-01T08:30:00.123456Z`, 1);
      }
      const whole = (await agent.get(`/api/vessels?sort=${sort}`).expect(200)).body.items.map(
        ({ id }: { id: string }) => id,
      );
      expect(whole).toHaveLength(7);
      const paged: string[] = [];
      let cursor: string | null = null;
      do {
        const page: { items: { id: string }[]; nextCursor: string | null } = (
          await agent
            .get(`/api/vessels?sort=${sort}&limit=2${cursor === null ? '' : `&cursor=${cursor}`}`)
            .expect(200)
        ).body;
        expect(page.items.length).toBeLessThanOrEqual(2);
        paged.push(...page.items.map(({ id }) => id));
        cursor = page.nextCursor;
      } while (cursor !== null);
      expect(paged).toEqual(whole);
    },
  );

  it('finds by name and home port, taking signs for what they are', async () => {
    await vesselWith('Snøfnugg 100%', []);
    await vesselWith('Snefonn', []);
    expect(await names('?q=snø')).toEqual(['Snøfnugg 100%']);
    expect(await names('?q=%25')).toEqual(['Snøfnugg 100%']);
    expect(await names('?q=_')).toEqual([]);
    expect(await names(`?q=${encodeURIComponent("' or 1=1 --")}`)).toEqual([]);
  });

  it('filters', async () => {
    await vesselWith('Late', [{ replaceByOn: OVERDUE }]);
    await vesselWith('Soon', [{ replaceByOn: WITHIN_A_YEAR }]);
    await vesselWith('Unknown', [{ assessment: 'not-assessed' }]);
    expect(await names('?filter=overdue')).toEqual(['Late']);
    expect(await names('?filter=due')).toEqual(['Soon']);
    expect(await names('?filter=not-assessed')).toEqual(['Unknown']);
    expect(await names('?filter=waiting')).toEqual([]);
  });

  it('refuses a cursor it did not make, a limit beyond the largest and words it does not know', async () => {
    for (const query of [
      'cursor=nonsense',
      'cursor=WyJ4Il0',
      'limit=201',
      'limit=0',
      'sort=price',
      'colour=red',
    ]) {
      const { body } = await agent.get(`/api/vessels?${query}`).expect(400);
      expect(body.code).toBe('invalid-request');
    }
  });

  it('shows nothing of a vessel on which the person has another role than theirs elsewhere', async () => {
    // A rigger whose second firm insures: the grant to the insurer must not open the rig to them.
    const insurer = await app.make.firm({ kind: 'insurer' });
    await app.make.insert('membership', {
      id: newId(),
      user_id: userId,
      firm_id: insurer.id,
      role: 'insurer',
      created_at: app.clock.now(),
    });
    const insured = await app.make.vessel({ name: 'Insured' });
    await app.make.grant(insured, `firm:${insurer.id}`, 'insurer');
    await vesselWith('Rigged', []);
    expect(await names()).toEqual(['Rigged']);
    expect((await agent.get(`/api/vessels/${insured.id}`).expect(403)).body.code).toBe('forbidden');
  });
});
