import ICAL from 'ical.js';
import type { Agent, TestApp } from '@stayledger/backend/testing/test-app';
import type { TestVessel } from '@stayledger/backend/testing/factories';
import type { RerigScheduleDto } from '@stayledger/shared/contracts/rerig-schedules';
import type { YardTermsDto } from '@stayledger/shared/contracts/yard-terms';
import { createTestService } from '../testing/log-journey.js';

// Plans are made by real threads and a real solver, on whatever else the machine is doing.
jest.setTimeout(90_000);
const PLANNED_WITHIN_MS = 60_000;

let app: TestApp;
beforeAll(async () => {
  app = await createTestService();
});
afterAll(() => app?.close());

interface Rig {
  vessel: TestVessel;
  rigger: Agent;
  owner: Agent;
}

/** A vessel with cap shrouds of strand and a rod forestay, all dated by the calendar from their fitting. */
async function riggedVessel(fittedOn: string): Promise<Rig> {
  const vessel = await app.make.vessel({ buildYear: 2012 });
  const rigger = await app.signIn(await app.make.userOn(vessel, 'rigger', { firmId: vessel.firmId }));
  const owner = await app.signIn(await app.make.userOn(vessel, 'owner'));
  for (const [kind, side, constructionId] of [
    ['cap-shroud', 'port', 'strand-1x19-316'],
    ['cap-shroud', 'starboard', 'strand-1x19-316'],
    ['forestay', 'centre', 'strand-1x19-316'],
  ] as const) {
    const position = await app.make.position(vessel, { kind, side, label: `${kind}, ${side}` });
    await rigger
      .post(`/api/positions/${position.id}/parts`)
      .send({
        constructionId,
        diameterMm: 8,
        lengthM: 14,
        upperTerminal: 'swaged',
        lowerTerminal: 'swaged',
        fittedOn,
      })
      .expect(201);
  }
  return { vessel, rigger, owner };
}

const pathOf = ({ vessel }: Pick<Rig, 'vessel'>) => `/api/vessels/${vessel.id}/rerig-schedule`;

async function scheduleOf(rig: Rig, agent = rig.rigger): Promise<RerigScheduleDto> {
  return (await agent.get(pathOf(rig)).expect(200)).body as RerigScheduleDto;
}

/** Asks for a plan and waits until it stands, or has failed. */
async function planned(rig: Rig, body: Record<string, unknown>, path = '/plans'): Promise<RerigScheduleDto> {
  const asked = await (
    path === '/plans' ? rig.rigger.post(pathOf(rig) + path) : rig.rigger.put(pathOf(rig) + path)
  )
    .send(body)
    .expect(path === '/plans' ? 202 : 200);
  expect((asked.body as RerigScheduleDto).planning?.state).toBe('queued');
  const until = performance.now() + PLANNED_WITHIN_MS;
  for (;;) {
    const now = await scheduleOf(rig);
    if (now.planning === null || now.planning.state === 'failed') return now;
    if (performance.now() > until) throw new Error(`the plan is still ${now.planning.state}`);
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

describe('the re-rig schedule of a vessel', () => {
  it('is planned, changed by hand, undone, proposed, asked about, accepted, booked and done', async () => {
    const rig = await riggedVessel('2024-05-10');
    expect(await scheduleOf(rig)).toMatchObject({
      plan: null,
      planning: null,
      version: null,
      state: 'draft',
    });

    const first = await planned(rig, {});
    const { plan, explanations, alternatives, windows } = first.plan!;
    expect(first.plan).toMatchObject({ number: 1, change: null, canUndo: false, diff: null });
    expect(plan.lateDays).toBe(0);
    expect(plan.proof.ended).toBe('proven');
    expect(plan.visits.length).toBeGreaterThan(0);
    // Nothing runs past its date, and each doing is explained.
    const tasks = plan.visits.flatMap((visit) => visit.tasks);
    expect(tasks.filter(({ dueOn, doneOn }) => dueOn !== null && doneOn > dueOn)).toEqual([]);
    expect(explanations).toHaveLength(tasks.length);
    expect(tasks.some(({ action, orderByOn }) => action === 'replace' && orderByOn !== null)).toBe(true);
    // The bill adds up, visit by visit.
    expect(plan.visits.reduce((sum, { totalMinor }) => sum + totalMinor, 0)).toBe(plan.totalMinor);
    const [least, fewest] = alternatives;
    expect(least.totalMinor).toBeLessThanOrEqual(fewest.totalMinor);
    expect(fewest.visits).toBeLessThanOrEqual(least.visits);

    const [visit] = plan.visits;
    const earlier = windows.find(({ id }) => !plan.visits.some(({ windowId }) => windowId === id))!;
    const moved = await planned(rig, {
      version: first.version,
      change: { change: 'move', fromWindowId: visit.windowId, toWindowId: earlier.id },
    });
    expect(moved.plan).toMatchObject({ number: 2, canUndo: true });
    expect(moved.plan!.plan.visits.map(({ windowId }) => windowId)).toContain(earlier.id);
    expect(moved.plan!.diff!.costMinor).toBe(moved.plan!.plan.totalMinor - plan.totalMinor);
    expect(moved.plan!.diff!.causes).toEqual(['Something was settled by hand.']);

    const undone = await rig.rigger
      .post(`${pathOf(rig)}/undo`)
      .send({ version: moved.version })
      .expect(200);
    expect(undone.body.plan).toEqual(first.plan);
    await rig.rigger
      .post(`${pathOf(rig)}/undo`)
      .send({ version: undone.body.version })
      .expect(409);

    expect(await scheduleOf(rig, rig.owner)).toMatchObject({ plan: null, draftHidden: true });
    const answer = (body: Record<string, unknown>, status: number) =>
      rig.owner
        .post(`${pathOf(rig)}/answer`)
        .send(body)
        .expect(status);
    await answer({ version: undone.body.version, answer: 'accept' }, 409);
    const go = async (version: number, state: string, status = 200) =>
      (
        await rig.rigger
          .post(`${pathOf(rig)}/state`)
          .send({ version, state })
          .expect(status)
      ).body as RerigScheduleDto;
    await go(undone.body.version as number, 'booked', 409);
    const proposed = await go(undone.body.version as number, 'proposed');
    expect((await scheduleOf(rig, rig.owner)).plan?.id).toBe(first.plan!.id);
    await answer({ version: proposed.version, answer: 'ask' }, 400);
    const asked = await answer(
      { version: proposed.version, answer: 'ask', question: 'Can the mast stay up?' },
      200,
    );
    expect(asked.body).toMatchObject({ state: 'proposed', question: 'Can the mast stay up?' });
    await answer({ version: proposed.version, answer: 'accept' }, 409);
    const accepted = await answer({ version: asked.body.version, answer: 'accept' }, 200);
    expect(accepted.body).toMatchObject({ state: 'accepted', question: null });
    const booked = await go(accepted.body.version as number, 'booked');
    const done = await go(booked.version!, 'done');
    expect(done.state).toBe('done');
    const { rows } = await app.database.admin.query<{ action: string }>(
      `select action from audit_event where vessel_id = $1 and action like 'rerig-schedule.%' order by at, id`,
      [rig.vessel.id],
    );
    expect(rows.map(({ action }) => action)).toEqual(
      [
        'planning-asked',
        'planned',
        'planning-asked',
        'planned',
        'undone',
        'proposed',
        'asked',
        'accepted',
        'booked',
        'done',
      ].map((step) => `rerig-schedule.${step}`),
    );
  });

  it('is not proposed once a date was worked out again, until it is planned anew', async () => {
    const rig = await riggedVessel('2024-05-10');
    const first = await planned(rig, {});
    expect(first.datesMoved).toBe(false);
    app.clock.advance({ minutes: 1 });
    await rig.owner
      .put(`/api/vessels/${rig.vessel.id}/usage-plan`)
      .send({ sailingHoursPerYear: 700 })
      .expect(200);
    const older = await scheduleOf(rig);
    expect(older.datesMoved).toBe(true);
    const propose = (version: number | null, status: number) =>
      rig.rigger
        .post(`${pathOf(rig)}/state`)
        .send({ version, state: 'proposed' })
        .expect(status);
    const refused = await propose(older.version, 409);
    expect(refused.body).toMatchObject({ code: 'state-conflict' });
    expect(refused.body.message).toContain('planned anew');
    const anew = await planned(rig, { version: older.version });
    expect(anew.datesMoved).toBe(false);
    await propose(anew.version, 200);
  });

  it('keeps clear of absences, says when no window is left, and goes on standing when planning fails', async () => {
    const rig = await riggedVessel('2024-05-10');
    const away = (fromOn: string, untilOn: string) => ({ fromOn, untilOn, reason: 'charter' });
    const first = await planned(
      rig,
      { horizonYears: 9, absences: [away('2026-01-01', '2031-12-31')] },
      '/settings',
    );
    expect(first.plan!.windows.every(({ opensOn }) => opensOn > '2031-12-31')).toBe(true);
    const failed = await planned(
      rig,
      { version: first.version, horizonYears: 9, absences: [away('2026-01-01', '2060-12-31')] },
      '/settings',
    );
    expect(failed.planning).toMatchObject({ state: 'failed', error: { code: 'no-window' } });
    expect(failed.plan!.id).toBe(first.plan!.id);
    await rig.rigger
      .put(`${pathOf(rig)}/settings`)
      .send({ version: failed.version, horizonYears: 9, absences: [away('2030-01-02', '2030-01-01')] })
      .expect(400);
  });

  it('gives the least-late plan with its reason for parts over their date, and refuses one that runs late by itself', async () => {
    const rig = await riggedVessel('2008-05-10');
    const late = await planned(rig, {});
    expect(late.plan!.plan.lateDays).toBeGreaterThan(0);
    expect(late.plan!.plan.lateTasks[0]).toMatchObject({ reason: 'overdue-already' });
    // Dropping the visit that mends it makes it later by somebody's hand: that plan cannot be accepted.
    const [visit] = late.plan!.plan.visits;
    const dropped = await planned(rig, {
      version: late.version,
      change: { change: 'drop', windowId: visit.windowId },
    });
    expect(dropped.plan!.plan.lateDays).toBeGreaterThan(late.plan!.plan.lateDays);
    const answered = async (version: number | null, status: number) => {
      const { body } = await rig.rigger
        .post(`${pathOf(rig)}/state`)
        .send({ version, state: 'proposed' })
        .expect(200);
      return rig.owner
        .post(`${pathOf(rig)}/answer`)
        .send({ version: (body as RerigScheduleDto).version, answer: 'accept' })
        .expect(status);
    };
    const refused = await answered(dropped.version, 409);
    expect(refused.body.message).toContain('past a date');
    const now = await scheduleOf(rig);
    const draft = await rig.rigger
      .post(`${pathOf(rig)}/state`)
      .send({ version: now.version, state: 'draft' })
      .expect(200);
    const undone = await rig.rigger
      .post(`${pathOf(rig)}/undo`)
      .send({ version: draft.body.version })
      .expect(200);
    const accepted = await answered((undone.body as RerigScheduleDto).version, 200);
    expect(accepted.body.state).toBe('accepted');
  });

  it('fails in words where the register is empty', async () => {
    const vessel = await app.make.vessel();
    const rigger = await app.signIn(await app.make.userOn(vessel, 'rigger', { firmId: vessel.firmId }));
    const { planning } = await planned({ vessel, rigger, owner: rigger }, {});
    expect(planning).toMatchObject({ state: 'failed', error: { code: 'nothing-to-plan' } });
  });

  it('has no room in a season that another vessel of the firm has booked full', async () => {
    const rig = await riggedVessel('2024-05-10');
    const terms = (await rig.rigger.get('/api/yard-terms').expect(200)).body as YardTermsDto;
    const seasons = terms.terms.seasons.map((season) => ({ ...season, berths: 1 }));
    await rig.rigger
      .put('/api/yard-terms')
      .send({ terms: { ...terms.terms, seasons } })
      .expect(200);
    const first = await planned(rig, {});
    const bookedIds = first.plan!.plan.visits.map(({ windowId }) => windowId);
    await app.database.admin.query(`update rerig_schedule set state = 'booked' where vessel_id = $1`, [
      rig.vessel.id,
    ]);
    const other = await app.make.vessel({ firmId: rig.vessel.firmId });
    const position = await app.make.position(other);
    await rig.rigger
      .post(`/api/positions/${position.id}/parts`)
      .send({
        constructionId: 'strand-1x19-316',
        diameterMm: 6,
        upperTerminal: 'swaged',
        lowerTerminal: 'swaged',
        fittedOn: '2024-05-10',
      })
      .expect(201);
    const second = await planned({ ...rig, vessel: other }, {});
    expect(second.plan!.windows.map(({ id }) => id).filter((id) => bookedIds.includes(id))).toEqual([]);
    expect(second.plan!.notes.join(' ')).toContain('The yard has no room left in');
  });

  it('is read back from its calendar file by another library, with UIDs that stay', async () => {
    const rig = await riggedVessel('2024-05-10');
    const first = await planned(rig, {});
    const read = async (agent: Agent) => {
      const { text, headers } = await agent.get(`${pathOf(rig)}/calendar`).expect(200);
      expect(headers['content-type']).toContain('text/calendar');
      return new ICAL.Component(ICAL.parse(text) as unknown[])
        .getAllSubcomponents('vevent')
        .map((component) => new ICAL.Event(component));
    };
    const events = await read(rig.rigger);
    const visits = events.filter(({ summary }) => summary.includes('yard visit'));
    expect(visits.map(({ startDate }) => [startDate.isDate, startDate.toString()])).toEqual(
      first.plan!.plan.visits.map(({ startOn }) => [true, startOn]),
    );
    // The end of a whole-day event is the day after its last one (RFC 5545, section 3.6.1).
    const lastDay = Date.parse(first.plan!.plan.visits[0].doneByOn) + 86_400_000;
    expect(Date.parse(visits[0].endDate.toString())).toBe(lastDay);
    const uids = events.map(({ uid }) => uid);
    expect(new Set(uids).size).toBe(uids.length);
    const again = await planned(rig, { version: first.version });
    expect(again.plan!.number).toBe(2);
    expect((await read(rig.rigger)).map(({ uid }) => uid)).toEqual(uids);
    // A draft is nothing for the owner's calendar yet.
    expect(await read(rig.owner)).toEqual([]);
  });
});
