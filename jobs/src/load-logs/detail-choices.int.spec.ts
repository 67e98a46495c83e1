import type { TestApp } from '@stayledger/backend/testing/test-app';
import type {
  DetailChoiceEffectDto,
  DetailChoicesDto,
  DetailWithChoiceDto,
} from '@stayledger/shared/contracts/detail-choices';
import type { CurveSpreadDto } from '@stayledger/shared/contracts/curve-spread';
import type { LedgerCheckDto, LedgerEntryDto } from '@stayledger/shared/contracts/ledger';
import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import {
  createLoggedVessel,
  createTestService,
  type LoggedVessel,
  swingingCsv,
  uploadLog,
} from '../testing/log-journey.js';

// Each test waits for real threads and a real database, on whatever else the machine is doing.
jest.setTimeout(120_000);

let app: TestApp;

beforeAll(async () => {
  app = await createTestService();
});
afterAll(() => app?.close());

const NOTHING = { curve: null, articulation: null, designFatigueFactor: null };

async function withLog(): Promise<LoggedVessel> {
  const logged = await createLoggedVessel(app);
  const csv = swingingCsv({ start: '2026-06-01T06:00:00Z', hours: 36, lowKn: 4, highKn: 14 });
  const log = await uploadLog(logged, csv);
  await logged.agent.post(`/api/load-logs/${log.id}/post`).send({ version: log.version }).expect(200);
  return logged;
}

async function choices({ agent, part }: LoggedVessel): Promise<DetailChoicesDto> {
  return (await agent.get(`/api/parts/${part.id}/detail-choices`).expect(200)).body as DetailChoicesDto;
}

function itemOf({ items }: DetailChoicesDto, key: string): DetailWithChoiceDto {
  const found = items.find((item) => item.key === key);
  if (!found) throw new Error(`no ${key}`);
  return found;
}

const choose = ({ agent, part }: LoggedVessel, key: string, body: object) =>
  agent.put(`/api/parts/${part.id}/detail-choices/${key}`).send(body);

async function preview({ agent, part }: LoggedVessel, key: string, body: object) {
  const reply = await agent
    .post(`/api/parts/${part.id}/detail-choices/${key}/preview`)
    .send(body)
    .expect(200);
  return reply.body as DetailChoiceEffectDto;
}

async function ledgerOf({ agent, part }: LoggedVessel): Promise<LedgerEntryDto[]> {
  return (await agent.get(`/api/parts/${part.id}/ledger?limit=200`).expect(200)).body.items;
}

async function usedOf({ agent, part }: LoggedVessel, name: string): Promise<number> {
  const life = (await agent.get(`/api/parts/${part.id}/life`).expect(200)).body as PartLifeDto;
  return life.details.find((detail) => detail.name === name)?.allowanceUsed ?? NaN;
}

describe('the strand curves side by side', () => {
  it('puts the history of a wire on each, the used one with the amount of its account', async () => {
    const logged = await withLog();
    const url = `/api/parts/${logged.part.id}/curve-spread`;
    const spread = (await logged.agent.get(url).expect(200)).body as CurveSpreadDto;
    expect(spread.items.map(({ curveId }) => curveId).sort()).toEqual([
      'api-rp-2sk-spiral-strand',
      'api-rp-2sk-stranded-rope',
      'dnv-os-e301-spiral-rope',
      'en-1993-1-11-150',
    ]);
    const used = spread.items.filter(({ isUsed }) => isUsed);
    expect(used.map(({ curveId }) => curveId)).toEqual(['en-1993-1-11-150']);
    expect(used[0].allowance / (await usedOf(logged, 'free length'))).toBeCloseTo(1, 12);
    const allowances = spread.items.map(({ allowance }) => allowance);
    expect(allowances).toEqual([...allowances].sort((a, b) => b - a));
  });

  it('has nothing to put side by side before any log', async () => {
    const fresh = await createLoggedVessel(app);
    const url = `/api/parts/${fresh.part.id}/curve-spread`;
    expect((await fresh.agent.get(url).expect(200)).body).toMatchObject({ items: [], loggedHours: 0 });
  });
});

describe('deciding about the inputs of a detail', () => {
  it('shows by how much the allowance would change, then changes it by that, reversing what stood', async () => {
    const logged = await withLog();
    const item = itemOf(await choices(logged), 'free-length');
    expect(item).toMatchObject({ curve: { id: 'en-1993-1-11-150' }, choice: null, hasArticulation: false });
    const curve = { id: 'en-1993-1-11-105', version: 1 };
    expect(item.curves).toContainEqual(expect.objectContaining(curve));
    const before = (await ledgerOf(logged)).filter(({ detailName }) => detailName === 'free length');

    const effect = await preview(logged, 'free-length', { ...NOTHING, curve });
    expect(effect.before).toBeCloseTo(await usedOf(logged, 'free length'), 14);
    expect(effect.entriesReversed).toBe(before.length);
    // Nothing was written by looking.
    expect((await ledgerOf(logged)).filter(({ detailName }) => detailName === 'free length')).toEqual(before);

    const evidence = 'Bar, not strand: certificate 4711';
    await choose(logged, 'free-length', { ...NOTHING, curve, evidence }).expect(200);
    const used = await usedOf(logged, 'free length');
    expect(used).toBeCloseTo(effect.after ?? NaN, 14);
    // 10 kN on 8 mm strand is some 260 MPa, above the knees of both categories, where their slope is 4: the damage
    // of one range goes with (150/105)^4 = 4.1649 (EN 1993-1-11, table 9.1). The first rise from slack is 14 kN.
    expect(used / (effect.before ?? NaN)).toBeCloseTo((150 / 105) ** 4, 6);

    const after = (await ledgerOf(logged)).filter(({ detailName }) => detailName === 'free length');
    expect(after.slice(-before.length)).toEqual(before);
    const reversals = after.filter(({ kind }) => kind === 'reversal');
    expect(reversals.map(({ reversesId }) => reversesId).sort()).toEqual(before.map(({ id }) => id).sort());
    expect(reversals[0].reason).toContain(evidence);
    expect(itemOf(await choices(logged), 'free-length')).toMatchObject({
      curve,
      choice: { curve, evidence, confirmedByName: logged.rigger.name, version: 1 },
      estimates: [],
    });
    const check = await logged.agent.post(`/api/vessels/${logged.vessel.id}/ledger/check`).expect(200);
    expect(check.body as LedgerCheckDto).toMatchObject({ differences: [], notRecomputed: [] });
    const { rows } = await app.database.admin.query(
      `select data ->> 'evidence' as evidence from audit_event where action = 'detail.chosen' and subject_id = $1`,
      [logged.part.id],
    );
    expect(rows).toEqual([{ evidence }]);
  });

  it('takes a factor without touching an entry, and goes back to the default', async () => {
    const logged = await withLog();
    const usedBefore = await usedOf(logged, 'upper terminal');
    const entries = await ledgerOf(logged);
    expect(itemOf(await choices(logged), 'upper-terminal').designFatigueFactor).toBe(10);
    const body = { ...NOTHING, designFatigueFactor: 5, evidence: 'Opened and looked at in May' };
    expect(
      (await preview(logged, 'upper-terminal', { ...NOTHING, designFatigueFactor: 5 })).entriesReversed,
    ).toBe(0);
    await choose(logged, 'upper-terminal', body).expect(200);
    expect(await usedOf(logged, 'upper terminal')).toBeCloseTo(usedBefore / 2, 14);
    expect(await ledgerOf(logged)).toEqual(
      entries.map((entry) =>
        entry.detailName === 'upper terminal'
          ? { ...entry, allowance: expect.closeTo(entry.allowance / 2, 14) }
          : entry,
      ),
    );
    await choose(logged, 'upper-terminal', { ...NOTHING, version: 1, evidence: 'The wrong one' }).expect(200);
    expect(await usedOf(logged, 'upper terminal')).toBe(usedBefore);
  });

  it('takes the bending off an end that turns in both planes', async () => {
    const logged = await withLog();
    const effect = await preview(logged, 'lower-terminal', { ...NOTHING, articulation: 'both-planes' });
    expect(effect.after).toBeLessThan(effect.before ?? 0);
    const free = await preview(logged, 'lower-terminal', { ...NOTHING, articulation: 'seized' });
    expect(free.after).toBeGreaterThan(effect.before ?? Infinity);
    await choose(logged, 'lower-terminal', {
      ...NOTHING,
      articulation: 'both-planes',
      evidence: 'Toggle seen',
    }).expect(200);
    const item = itemOf(await choices(logged), 'lower-terminal');
    expect(item.explanation).toContain('It turns in both planes: no bending.');
    // The choice outlives a change of the part's description.
    const { body: part } = await logged.agent.get(`/api/parts/${logged.part.id}`).expect(200);
    await logged.agent
      .patch(`/api/parts/${logged.part.id}`)
      .send({ version: part.version, threadSize: 'M16' })
      .expect(200);
    expect(itemOf(await choices(logged), 'lower-terminal').explanation).toBe(item.explanation);
  });

  it('refuses what could not be used', async () => {
    const logged = await createLoggedVessel(app, { lowerTerminal: 'unknown' });
    const refused = async (key: string, body: object) =>
      (await choose(logged, key, { ...NOTHING, evidence: 'seen', ...body }).expect(400)).body.fieldErrors;
    expect(await refused('free-length', { curve: { id: 'api-rp-2sk-spiral-strand', version: 1 } })).toEqual({
      curve: [expect.stringContaining('of the same measure')],
    });
    expect(await refused('free-length', { curve: { id: 'no-such-curve', version: 1 } })).toHaveProperty(
      'curve',
    );
    expect(await refused('free-length', { articulation: 'none' })).toHaveProperty('articulation');
    expect(await refused('free-length', { designFatigueFactor: 1 })).toHaveProperty('designFatigueFactor');
    expect(await refused('free-length', { evidence: '  ' })).toHaveProperty('evidence');
    expect(await refused('lower-terminal', { curve: { id: 'en-1993-1-11-150', version: 1 } })).toEqual({
      curve: ['Describe the part first. The kind of terminal is not known.'],
    });
    await choose(logged, 'no-such-detail', { ...NOTHING, evidence: 'seen' }).expect(404);
    const owner = await app.signIn(await app.make.userOn(logged.vessel, 'owner'));
    await owner.get(`/api/parts/${logged.part.id}/detail-choices`).expect(200);
    await choose({ ...logged, agent: owner }, 'free-length', { ...NOTHING, evidence: 'seen' }).expect(403);
  });

  it('is decided once when two people decide at the same moment', async () => {
    const logged = await createLoggedVessel(app);
    const other = await app.signIn(await app.make.userOn(logged.vessel, 'surveyor'));
    const body = { ...NOTHING, designFatigueFactor: 5, evidence: 'seen' };
    const replies = await Promise.all(
      [logged.agent, other].map((agent) => choose({ ...logged, agent }, 'free-length', body)),
    );
    expect(replies.map(({ status }) => status).sort()).toEqual([200, 409]);
  });
});
