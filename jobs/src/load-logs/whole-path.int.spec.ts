import { EntityManager } from '@mikro-orm/postgresql';
import { contentOf } from '@stayledger/backend/ledger/account.service';
import { firstBrokenEntry } from '@stayledger/backend/ledger/entry-hash';
import { LedgerEntry } from '@stayledger/backend/ledger/ledger-entry.entity';
import { withAccess } from '@stayledger/backend/persistence';
import type { TestApp } from '@stayledger/backend/testing/test-app';
import type { LedgerEntryDto } from '@stayledger/shared/contracts/ledger';
import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import type { LoadLogDto, LogReviewDto } from '@stayledger/shared/contracts/load-logs';
import { Client } from 'pg';
import {
  createLoggedVessel,
  createTestService,
  type LoggedVessel,
  settled,
  swingingCsv,
  uploadLog,
} from '../testing/log-journey.js';

// Each test waits for real threads and a real database, on whatever else the machine is doing.
jest.setTimeout(60_000);

let app: TestApp;

beforeAll(async () => {
  app = await createTestService();
});
afterAll(() => app?.close());

function post(logged: LoggedVessel, log: { id: string; version: number }) {
  return logged.agent.post(`/api/load-logs/${log.id}/post`).send({ version: log.version });
}

/** Posts a log, or fails with what the service said. */
async function posted(logged: LoggedVessel, log: LoadLogDto): Promise<LoadLogDto> {
  const reply = await post(logged, log);
  if (reply.status !== 200) throw new Error(`not posted: ${JSON.stringify(reply.body)}`);
  return reply.body as LoadLogDto;
}

async function lifeOf({ agent, part }: LoggedVessel): Promise<PartLifeDto> {
  return (await agent.get(`/api/parts/${part.id}/life`).expect(200)).body as PartLifeDto;
}

async function ledgerOf({ agent, part }: LoggedVessel): Promise<LedgerEntryDto[]> {
  return (await agent.get(`/api/parts/${part.id}/ledger?limit=200`).expect(200)).body.items;
}

describe('from a log to a date', () => {
  it('uploads, counts, reviews, posts, and dates a part, every figure as by hand', async () => {
    const logged = await createLoggedVessel(app);
    // 40 h of a stay swinging between 4 and 14 kN, one turn each 2 minutes: 1,200 rises of 10 kN.
    const csv = swingingCsv({ start: '2026-06-01T06:00:00Z', hours: 40, lowKn: 4, highKn: 14 });
    const log = await uploadLog(logged, csv);
    expect(log).toMatchObject({
      state: 'counted',
      rows: 2401,
      loggedHours: expect.closeTo(40, 1),
      fromAt: '2026-06-01T06:00:00.000Z',
      failure: null,
      sameFileAs: null,
      job: { state: 'done', progress: 1, attempts: 1 },
    });
    expect(log.findings.find(({ code }) => code === 'rounding')?.message).toContain('steps of 0.01 kN');

    const review = (await logged.agent.get(`/api/load-logs/${log.id}/review`).expect(200))
      .body as LogReviewDto;
    expect(review.postDisabledReason).toBeNull();
    expect(review.traces).toHaveLength(1);
    expect(review.traces[0]).toMatchObject({ minKn: 4, maxKn: 14, samples: 2401, missing: 0 });
    expect(Math.max(...review.traces[0].highKn)).toBe(14);
    expect(review.traces[0].atMs.length).toBeLessThanOrEqual(600);
    expect(await ledgerOf(logged)).toEqual([]);

    const decided = await posted(logged, log);
    expect(decided).toMatchObject({ state: 'posted', decidedByName: logged.rigger.name });

    // The thread by hand: M12 has a tensile stress area of 84.3 mm2 (ISO 898-1), so 10 kN are 118.6 MPa. EN 1993-1-9
    // category 50: N = 2e6 (50/S)^3 = 1.4985e5 above the knee at 5e6 cycles (S 36.8 MPa); life halved for salt air.
    // In the log 1,199 cycles close; between the logs the rise from 0 to 14 and the residue of halves stand.
    const entries = await ledgerOf(logged);
    const thread = entries.filter(({ detailName }) => detailName === 'turnbuckle thread');
    expect(thread.map(({ kind }) => kind).sort()).toEqual(['between-logs', 'recorded']);
    const stressMpa = 10_000 / 84.27;
    const perCycle = 2 / (2e6 * (50 / stressMpa) ** 3);
    const recorded = thread.find(({ kind }) => kind === 'recorded');
    expect((recorded?.damage ?? 0) / (1199 * perCycle)).toBeCloseTo(1, 2);
    expect(review.parts[0].details.find(({ name }) => name === 'turnbuckle thread')?.after).toBeCloseTo(
      thread.reduce((sum, { allowance }) => sum + allowance, 0),
      12,
    );

    const before = await lifeOf(logged);
    expect(before.standing.assessment).toBe('assessed');
    expect(before.standing.fatigueReplaceByOn).toBeNull();
    expect(before.wouldGiveDate).toEqual(['A usage plan: the sailing hours planned per year.']);
    expect(before.standing.governingRule).toBe('calendar');

    const plan = { sailingHoursPerYear: 100, note: 'weekends' };
    await logged.agent.put(`/api/vessels/${logged.vessel.id}/usage-plan`).send(plan).expect(200);
    const life = await lifeOf(logged);
    const governing = life.details.find(({ name }) => name === life.standing.governingDetail);
    const damage = sum(
      entries.filter(({ detailId }) => detailId === governing?.detailId).map((e) => e.damage),
    );
    const dff = governing?.designFatigueFactor ?? 0;
    // The rule date: what is left of 1/DFF over what 100 h like the logged 40 h use in a year.
    const years = (1 / dff - damage) / ((damage / (log.loggedHours ?? 0)) * 100);
    expect(life.standing.allowanceUsed).toBeCloseTo(damage * dff, 12);
    expect(life.standing.remainingYears).toBeCloseTo(years, 9);
    const days = Math.floor(years * 365.25);
    const expected = new Date(Date.parse('2027-07-01') + days * 86_400_000).toISOString().slice(0, 10);
    expect(life.standing.fatigueReplaceByOn).toBe(expected);
    expect(life.standing).toMatchObject({ replaceByOn: expected, governingRule: 'fatigue', due: 'due' });
    expect(life.headline).toContain('At the planned 100 sailing hours a year it is used up by');
    expect(life.plainHeadline).not.toContain('%');

    // 40 h from 6 in the morning touch 1 and 2 June in Oslo; the days share the whole damage.
    expect(life.days.map(({ dayOn }) => dayOn)).toEqual(['2026-06-01', '2026-06-02']);
    expect(sum(life.days.map(({ allowance }) => allowance))).toBeCloseTo(damage * dff, 10);
    expect(sum(life.worstDays.map(({ shareOfTotal }) => shareOfTotal))).toBeCloseTo(1, 10);
    expect(sum(life.cycles.bins.map(({ damageShare }) => damageShare))).toBeCloseTo(1, 10);
    expect(life.forecast.at(-1)).toEqual({ on: expected, allowance: 1 });
    expect(life.working.length).toBeGreaterThanOrEqual(7);
    expect(life.working[0].result).toMatchObject({ symbol: 'dF', value: expect.closeTo(10, 9), unit: 'kN' });
    expect(life.working.every(({ source }) => source.length > 0)).toBe(true);
    expect(life.assumptions.join(' ')).toContain('never replaces inspection by a competent person');
  });

  it('answers the owner, who may read and not decide', async () => {
    const logged = await createLoggedVessel(app);
    const owner = await app.signIn(await app.make.userOn(logged.vessel, 'owner'));
    const log = await uploadLog({ ...logged, agent: owner }, june({}));
    expect(log.state).toBe('counted');
    await owner.post(`/api/load-logs/${log.id}/post`).send({ version: log.version }).expect(403);
    const reason = 'not mine to say';
    await owner.post(`/api/load-logs/${log.id}/set-aside`).send({ version: log.version, reason }).expect(403);
    await owner.get(`/api/parts/${logged.part.id}/life`).expect(200);
    expect((await logged.agent.get(`/api/load-logs/${log.id}`)).body.state).toBe('counted');
  });

  it('remembers what columns were matched to', async () => {
    const logged = await createLoggedVessel(app);
    await uploadLog(logged, june({}));
    const { body } = await logged.agent.get(`/api/vessels/${logged.vessel.id}/channel-mappings`).expect(200);
    expect(body.items).toEqual([{ column: 'cap_port_kN', unit: 'kN', positionId: logged.position.id }]);
  });
});

describe('the same twice', () => {
  it('recognises the same file by its bytes and never posts it twice', async () => {
    const logged = await createLoggedVessel(app);
    const csv = june({});
    const first = await uploadLog(logged, csv);
    await posted(logged, first);
    const entries = await ledgerOf(logged);
    const second = await uploadLog(logged, csv, { fileName: 'again.csv' });
    expect(second.sameFileAs).toEqual({ id: first.id, state: 'posted', fileName: 'week.csv' });
    const review = await logged.agent.get(`/api/load-logs/${second.id}/review`).expect(200);
    expect(review.body.postDisabledReason).toContain('The same file was posted before, as week.csv');
    const refused = await post(logged, second).expect(409);
    expect(refused.body).toMatchObject({ code: 'state-conflict', current: { state: 'counted' } });
    expect(await ledgerOf(logged)).toEqual(entries);
  });

  it('posts a log once when two people post it at the same moment', async () => {
    const logged = await createLoggedVessel(app);
    const log = await uploadLog(logged, june({}));
    const other = await app.signIn(await app.make.userOn(logged.vessel, 'surveyor'));
    const replies = await Promise.all([post(logged, log), post({ ...logged, agent: other }, log)]);
    expect(replies.map(({ status }) => status).sort()).toEqual([200, 409]);
    const refused = replies.find(({ status }) => status === 409);
    expect(refused?.body).toMatchObject({ code: 'version-conflict', current: { state: 'posted' } });
    const recorded = (await ledgerOf(logged)).filter(({ kind }) => kind === 'recorded');
    expect(new Set(recorded.map(({ detailId }) => detailId)).size).toBe(recorded.length);
  });

  it('gives the same ledger whichever of two logs is posted first', async () => {
    const early = june({ lowKn: 3, highKn: 12 });
    const late = june({ start: '2026-06-20T06:00:00Z', lowKn: 6, highKn: 15 });
    const standingAfter = async (order: readonly string[]) => {
      const logged = await createLoggedVessel(app);
      for (const csv of order) await posted(logged, await uploadLog(logged, csv));
      const entries = await ledgerOf(logged);
      const reversed = new Set(entries.map(({ reversesId }) => reversesId));
      const standing = entries.filter(({ id, kind }) => kind !== 'reversal' && !reversed.has(id));
      return {
        amounts: standing.map(({ detailName, kind, damage }) => `${detailName} ${kind} ${damage}`).sort(),
        reversals: entries.filter(({ kind }) => kind === 'reversal').length,
        total: sum(entries.map(({ damage }) => damage)),
        used: (await lifeOf(logged)).standing.allowanceUsed,
      };
    };
    const forth = await standingAfter([early, late]);
    const back = await standingAfter([late, early]);
    expect(back.amounts).toEqual(forth.amounts);
    expect(back.used).toBe(forth.used);
    expect(back.total).toBeCloseTo(forth.total, 12);
    // One between-logs entry per assessed detail was reversed and written anew.
    expect(forth.reversals).toBe(forth.amounts.filter((line) => line.includes('between-logs')).length);
  });

  it('refuses a log whose hours are posted already from another file', async () => {
    const logged = await createLoggedVessel(app);
    await posted(logged, await uploadLog(logged, june({})));
    const overlapping = await uploadLog(logged, june({ start: '2026-06-02T00:00:00Z', highKn: 13 }));
    const refused = await post(logged, overlapping).expect(409);
    expect(refused.body.message).toContain('overlaps week.csv, which is posted');
  });
});

describe('deciding', () => {
  it('sets a log aside with a reason and writes no entry', async () => {
    const logged = await createLoggedVessel(app);
    const log = await uploadLog(logged, june({}));
    const url = `/api/load-logs/${log.id}/set-aside`;
    await logged.agent.post(url).send({ version: log.version, reason: ' ' }).expect(400);
    const { body } = await logged.agent
      .post(url)
      .send({ version: log.version, reason: 'mast was out' })
      .expect(200);
    expect(body).toMatchObject({ state: 'set-aside', decisionReason: 'mast was out' });
    expect(await ledgerOf(logged)).toEqual([]);
    await post(logged, body).expect(409);
    const events = await app.database.admin.query(
      `select action from audit_event where subject_id = $1 order by id`,
      [log.id],
    );
    expect(events.rows.map(({ action }) => action)).toEqual([
      'load-log.announced',
      'load-log.received',
      'load-log.counted',
      'load-log.set-aside',
    ]);
  });

  it('refuses loads above the breaking load, and takes them after the unit is put right', async () => {
    const logged = await createLoggedVessel(app);
    // The recorder wrote kilograms-force: 1,020 kgf is 10.0 kN; read as kN it is 25 times the breaking load.
    const csv = june({ lowKn: 408, highKn: 1020 });
    const log = await uploadLog(logged, csv);
    expect(log.findings).toContainEqual(
      expect.objectContaining({ severity: 'serious', column: 'cap_port_kN' }),
    );
    const refused = await post(logged, log).expect(409);
    expect(refused.body.message).toContain('is above the breaking load of 40.0 kN');
    const channels = [{ column: 'cap_port_kN', unit: 'kgf', positionId: logged.position.id }];
    const mapping = { ...log.mapping, channels };
    await logged.agent
      .post(`/api/load-logs/${log.id}/recount`)
      .send({ version: log.version, mapping })
      .expect(200);
    const again = await settled(logged.agent, log.id);
    expect(again).toMatchObject({ state: 'counted', mapping: { channels } });
    const review = await logged.agent.get(`/api/load-logs/${log.id}/review`).expect(200);
    expect(review.body.traces).toHaveLength(1);
    // 1 kgf is 9.80665 N by definition.
    expect(review.body.traces[0].maxKn).toBeCloseTo(1020 * 0.00980665, 2);
    await posted(logged, again);
  });

  it('posts nothing to a part that was fitted after the log, and says so', async () => {
    const logged = await createLoggedVessel(app, { fittedOn: '2026-06-15' });
    const log = await uploadLog(logged, june({}));
    const { body } = await logged.agent.get(`/api/load-logs/${log.id}/review`).expect(200);
    expect(body.parts[0]).toMatchObject({ before: null, after: null });
    expect(body.postDisabledReason).toContain('began before the part was fitted (2026-06-15)');
    await post(logged, log).expect(409);
  });

  it('reverses and rewrites what a log recorded when a detail is described better', async () => {
    const logged = await createLoggedVessel(app);
    await posted(logged, await uploadLog(logged, june({})));
    const before = (await ledgerOf(logged)).filter(({ detailName }) => detailName === 'turnbuckle thread');
    await logged.agent
      .patch(`/api/parts/${logged.part.id}`)
      .send({ version: logged.part.version, threadSize: 'M16' })
      .expect(200);
    const after = (await ledgerOf(logged)).filter(({ detailName }) => detailName === 'turnbuckle thread');
    expect(
      after
        .filter(({ kind }) => kind === 'reversal')
        .map(({ reversesId }) => reversesId)
        .sort(),
    ).toEqual(before.map(({ id }) => id).sort());
    const reversed = new Set(after.map(({ reversesId }) => reversesId));
    const recorded = after.find(({ id, kind }) => kind === 'recorded' && !reversed.has(id));
    const old = before.find(({ kind }) => kind === 'recorded');
    // Stress areas of M16 and M12 are 156.7 and 84.27 mm2 (ISO 898-1); slope 3 throughout this range.
    expect((old?.damage ?? 0) / (recorded?.damage ?? 1)).toBeCloseTo((156.67 / 84.27) ** 3, 1);
    await expectChainsHold(logged);
  });
});

describe('the account', () => {
  it('chains every entry and lets the application change none', async () => {
    const logged = await createLoggedVessel(app);
    await posted(logged, await uploadLog(logged, june({})));
    await posted(logged, await uploadLog(logged, june({ start: '2026-06-20T06:00:00Z' })));
    await expectChainsHold(logged);
    const client = new Client({ connectionString: app.database.appUrl });
    await client.connect();
    try {
      await client.query(`select set_config('app.parties', $1, false)`, [`vessel:${logged.vessel.id}`]);
      const { rows } = await client.query('select count(*)::int as count from ledger_entry');
      expect(rows[0].count).toBeGreaterThan(0);
      await expect(client.query('update ledger_entry set damage = 0')).rejects.toThrow('permission denied');
      await expect(client.query('delete from ledger_entry')).rejects.toThrow('permission denied');
    } finally {
      await client.end();
    }
  });
});

function june(options: { start?: string; lowKn?: number; highKn?: number }): string {
  const { start = '2026-06-01T06:00:00Z', lowKn = 4, highKn = 14 } = options;
  return swingingCsv({ start, hours: 36, lowKn, highKn });
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}

async function expectChainsHold({ part, vessel }: LoggedVessel): Promise<void> {
  const em = app.nest.get(EntityManager);
  const entries = await withAccess(em, { vesselId: vessel.id }, (inner) =>
    inner.find(LedgerEntry, { fittedPart: part.id }, { orderBy: { sequence: 'asc' } }),
  );
  const details = new Set(entries.map(({ partDetail }) => partDetail));
  expect(details.size).toBeGreaterThan(2);
  for (const detail of details) {
    const chain = entries
      .filter(({ partDetail }) => partDetail === detail)
      .map((entry) => ({ ...contentOf(entry), previousHash: entry.previousHash, hash: entry.hash }));
    expect(firstBrokenEntry(chain)).toBeNull();
  }
}
