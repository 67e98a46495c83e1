import type { TestApp } from '@stayledger/backend/testing/test-app';
import type { LedgerCheckDto, LedgerEntryDto } from '@stayledger/shared/contracts/ledger';
import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import type { LoadLogDto, LogReviewDto } from '@stayledger/shared/contracts/load-logs';
import {
  createLoggedVessel,
  createTestService,
  type LoggedVessel,
  settled,
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

const week = (start: string, highKn = 14) => swingingCsv({ start, hours: 24, lowKn: 4, highKn });

async function decide(
  { agent }: LoggedVessel,
  log: { id: string; version: number },
  how: 'post' | 'reverse' | 'set-aside',
  reason?: string,
): Promise<LoadLogDto> {
  const reply = await agent.post(`/api/load-logs/${log.id}/${how}`).send({ version: log.version, reason });
  if (reply.status !== 200) throw new Error(`not done: ${JSON.stringify(reply.body)}`);
  return reply.body as LoadLogDto;
}

async function check({ agent, vessel }: LoggedVessel): Promise<LedgerCheckDto> {
  return (await agent.post(`/api/vessels/${vessel.id}/ledger/check`).expect(200)).body as LedgerCheckDto;
}

async function ledgerOf({ agent, part }: LoggedVessel): Promise<LedgerEntryDto[]> {
  return (await agent.get(`/api/parts/${part.id}/ledger?limit=200`).expect(200)).body.items;
}

async function usedBy({ agent, part }: LoggedVessel): Promise<number | null> {
  const life = (await agent.get(`/api/parts/${part.id}/life`).expect(200)).body as PartLifeDto;
  return life.standing.allowanceUsed;
}

/** A vessel with two posted logs. */
async function withTwoLogs(): Promise<{ logged: LoggedVessel; first: LoadLogDto; second: LoadLogDto }> {
  const logged = await createLoggedVessel(app);
  const first = await uploadLog(logged, week('2026-06-01T06:00:00Z'), { fileName: 'first.csv' });
  const second = await uploadLog(logged, week('2026-06-10T06:00:00Z', 15), { fileName: 'second.csv' });
  return {
    logged,
    first: await decide(logged, first, 'post'),
    second: await decide(logged, second, 'post'),
  };
}

describe('checking the ledger', () => {
  it('recomputes every amount, also of entries whose detail was described otherwise', async () => {
    const { logged } = await withTwoLogs();
    await logged.agent
      .patch(`/api/parts/${logged.part.id}`)
      .send({ version: logged.part.version, threadSize: 'M16' })
      .expect(200);
    const entries = await ledgerOf(logged);
    const done = await check(logged);
    expect(done).toMatchObject({
      vesselName: logged.vessel.name,
      parts: 1,
      entries: entries.length,
      differences: [],
      notRecomputed: [],
    });
    const reversals = entries.filter(({ kind }) => kind === 'reversal').length;
    expect(reversals).toBeGreaterThan(3);
    expect(done.reversals).toBe(reversals);
    expect(done.recomputed).toBe(entries.length - reversals);
    const { rows } = await app.database.admin.query(
      `select data from audit_event where action = 'ledger.checked' and vessel_id = $1`,
      [logged.vessel.id],
    );
    expect(rows).toEqual([{ data: { entries: entries.length, differences: 0 } }]);
  });

  it('names an altered amount, with what was written and what comes out', async () => {
    const { logged } = await withTwoLogs();
    const [victim] = (await ledgerOf(logged)).filter(({ kind }) => kind === 'recorded');
    // Only the database's superuser can do this; the service's role may not.
    await app.database.admin.query('update ledger_entry set damage = damage / 2 where id = $1', [victim.id]);
    const { differences } = await check(logged);
    expect(differences).toHaveLength(2);
    for (const one of differences) {
      expect(one).toMatchObject({
        entryId: victim.id,
        positionLabel: logged.position.label,
        detailName: victim.detailName,
        sequence: victim.sequence,
        kind: 'recorded',
      });
    }
    expect(differences[0].what).toContain('its hash differs');
    expect(differences[1].written).toBe(victim.damage / 2);
    expect((differences[1].recomputed ?? 0) / victim.damage).toBeCloseTo(1, 12);
  });

  it('finds an entry that was taken out and one that was taken off the end', async () => {
    const { logged } = await withTwoLogs();
    const thread = (await ledgerOf(logged)).filter(({ detailName }) => detailName === 'turnbuckle thread');
    const [last] = thread;
    await app.database.admin.query('delete from ledger_entry where id = $1', [last.id]);
    const cut = await check(logged);
    // The chain alone cannot miss its last link: the posted logs say what should be there.
    expect(cut.differences.map(({ what, detailName }) => `${detailName}: ${what}`)).toEqual([
      'turnbuckle thread: An entry the posted logs call for is not in the account.',
    ]);
    const first = thread.find(({ sequence }) => sequence === 1);
    const { rows } = await app.database.admin.query('delete from ledger_entry where id = $1 returning kind', [
      first?.id,
    ]);
    expect(rows).toEqual([{ kind: 'recorded' }]);
    expect((await check(logged)).differences.map(({ what }) => what)).toContain('1 entry is gone before it.');
  });

  it('finds a stored spectrum that was altered', async () => {
    const { logged, second } = await withTwoLogs();
    await app.database.admin.query(
      `update load_spectrum s set data = set_byte(data, 40, 255 - get_byte(data, 40)) from log_channel c
        where c.id = s.log_channel_id and c.load_log_id = $1`,
      [second.id],
    );
    const { differences, recomputed } = await check(logged);
    expect(differences.map(({ what }) => what)).toContain(
      'A load spectrum it was computed from was altered: its hash differs.',
    );
    // The first log's own amounts hold still.
    expect(recomputed).toBeGreaterThan(0);
  });

  it('is for those who look after the vessel', async () => {
    const { logged } = await withTwoLogs();
    const owner = await app.signIn(await app.make.userOn(logged.vessel, 'owner'));
    await owner.post(`/api/vessels/${logged.vessel.id}/ledger/check`).expect(403);
    const stranger = await app.signIn(await app.make.member('rigger'));
    await stranger.post(`/api/vessels/${logged.vessel.id}/ledger/check`).expect(404);
  });
});

describe('taking a posted log back', () => {
  it('reverses what it recorded, gives the account of the other log alone, and can be posted again', async () => {
    const alone = await createLoggedVessel(app);
    await decide(alone, await uploadLog(alone, week('2026-06-01T06:00:00Z')), 'post');
    const { logged, second } = await withTwoLogs();
    const withBoth = await usedBy(logged);
    const before = await ledgerOf(logged);

    const back = await decide(logged, second, 'reverse', 'The cell had slipped');
    expect(back).toMatchObject({
      state: 'counted',
      decidedByName: logged.rigger.name,
      decisionReason: 'The cell had slipped',
    });
    // The same as if it had never been posted, computed on another vessel that never had it.
    expect(await usedBy(logged)).toBe(await usedBy(alone));
    const after = await ledgerOf(logged);
    expect(after.slice(-before.length)).toEqual(before);
    const added = after.slice(0, after.length - before.length);
    const mine = before.filter(({ loadLogId }) => loadLogId === second.id);
    expect(mine.length).toBeGreaterThan(3);
    for (const entry of mine) {
      expect(added).toContainEqual(
        expect.objectContaining({
          kind: 'reversal',
          reversesId: entry.id,
          damage: 0 - entry.damage,
          reason: 'The cell had slipped',
          postedByName: logged.rigger.name,
        }),
      );
    }
    expect((await check(logged)).differences).toEqual([]);

    const again = await decide(logged, back, 'post');
    expect(again).toMatchObject({ state: 'posted', decisionReason: null });
    expect(await usedBy(logged)).toBe(withBoth);
    expect(await check(logged)).toMatchObject({ differences: [], notRecomputed: [] });
    const { rows } = await app.database.admin.query(
      `select action, data ->> 'reason' as reason from audit_event
        where subject_id = $1 and action in ('load-log.posted', 'load-log.reversed') order by id`,
      [second.id],
    );
    expect(rows).toEqual([
      { action: 'load-log.posted', reason: null },
      { action: 'load-log.reversed', reason: 'The cell had slipped' },
      { action: 'load-log.posted', reason: null },
    ]);
  });

  it('lets the log be read in another way, or be set aside, and the old entries still add up', async () => {
    const logged = await createLoggedVessel(app);
    const posted = await decide(logged, await uploadLog(logged, week('2026-06-01T06:00:00Z')), 'post');
    const back = await decide(logged, posted, 'reverse', 'wrong unit');
    expect(await usedBy(logged)).toBeNull();
    const channels = [{ ...back.mapping.channels[0], unit: 'tf' }];
    await logged.agent
      .post(`/api/load-logs/${back.id}/recount`)
      .send({ version: back.version, mapping: { ...back.mapping, channels } })
      .expect(200);
    const recounted = await settled(logged.agent, back.id);
    expect(recounted.state).toBe('counted');
    const review = (await logged.agent.get(`/api/load-logs/${back.id}/review`).expect(200))
      .body as LogReviewDto;
    expect(review.postDisabledReason).toContain('above the breaking load');
    const aside = await decide(logged, recounted, 'set-aside', 'the unit is not known');
    expect(aside).toMatchObject({ state: 'set-aside', decisionReason: 'the unit is not known' });
    // The entries of the first reading are recomputed from the spectrum of the first reading.
    const done = await check(logged);
    expect(done).toMatchObject({ differences: [], notRecomputed: [] });
    expect(done.recomputed).toBe(done.reversals);
  });

  it('wants a reason and a posted log, and is done once when two people do it', async () => {
    const { logged, second } = await withTwoLogs();
    const url = `/api/load-logs/${second.id}/reverse`;
    await logged.agent.post(url).send({ version: second.version, reason: '  ' }).expect(400);
    const other = await app.signIn(await app.make.userOn(logged.vessel, 'surveyor'));
    const body = { version: second.version, reason: 'slipped' };
    const replies = await Promise.all([logged.agent, other].map((agent) => agent.post(url).send(body)));
    expect(replies.map(({ status }) => status).sort()).toEqual([200, 409]);
    const done = replies.find(({ status }) => status === 200)?.body as LoadLogDto;
    const refused = await logged.agent
      .post(url)
      .send({ ...body, version: done.version })
      .expect(409);
    expect(refused.body.message).toBe('This log is counted; only a posted log can be taken back.');
  });
});
