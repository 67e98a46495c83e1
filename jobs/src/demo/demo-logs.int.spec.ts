import { MikroORM } from '@mikro-orm/postgresql';
import { LogIntake } from '@stayledger/backend/app';
import { ormOptions } from '@stayledger/backend/database/mikro-orm.config';
import { seedDemo } from '@stayledger/backend/database/seed/demo';
import { readDemo, type DemoStart } from '@stayledger/backend/database/seed/read-demo';
import { DEMO_PASSWORD } from '@stayledger/backend/auth/demo';
import { DEMO_VESSELS } from '@stayledger/backend/database/seed/demo-scenario';
import type { Agent, TestApp } from '@stayledger/backend/testing/test-app';
import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import type { PositionDto } from '@stayledger/shared/contracts/rig';
import { createTestService, settled } from '../testing/log-journey.js';
import { bringInDemoLogs } from './bring-in-demo-logs.js';
import { cutterLogs, sloopLogs } from './demo-logs.js';

jest.setTimeout(60_000);

let app: TestApp;
let demo: DemoStart;
let rigger: Agent;

beforeAll(async () => {
  app = await createTestService({ STAYLEDGER_DEMO: '1' });
  const orm = await MikroORM.init(ormOptions(app.database.ownerUrl));
  try {
    await seedDemo(orm.em.fork(), app.clock);
    const start = await readDemo(app.env, orm.em);
    if (start === null) throw new Error('the demo was to be there');
    demo = start;
  } finally {
    await orm.close(true);
  }
  await tell();
  rigger = await app.signIn({ email: 'rigger@demo.stayledger.example' }, DEMO_PASSWORD);
});
afterAll(() => app?.close());

function tell(): Promise<void> {
  const signal = new AbortController().signal;
  return bringInDemoLogs({
    ...demo,
    intake: app.nest.get(LogIntake),
    logger: { log: () => undefined },
    signal,
  });
}

const [cutter, , , sloop] = DEMO_VESSELS;

async function logsOf(vesselId: string): Promise<LoadLogDto[]> {
  const { body } = await rigger.get(`/api/vessels/${vesselId}/load-logs`).expect(200);
  return Promise.all((body.items as LoadLogDto[]).map(({ id }) => settled(rigger, id)));
}

async function rigOf(vesselId: string): Promise<PositionDto[]> {
  return (await rigger.get(`/api/vessels/${vesselId}/rig`).expect(200)).body.items;
}

describe('the story of the demo', () => {
  it('has a posted log, one that waits, and a poor one', async () => {
    const logs = await logsOf(cutter.id);
    expect(logs.map(({ fileName, state }) => [fileName, state]).sort()).toEqual([
      ['ternesund-cruise.csv.gz', 'posted'],
      ['ternesund-last-week.csv.gz', 'counted'],
    ]);
    const [poor] = await logsOf(sloop.id);
    expect(poor).toMatchObject({ state: 'counted' });
    const serious = poor.findings.filter(({ severity }) => severity === 'serious');
    expect(serious.length).toBeGreaterThan(0);
    expect(poor.findings.map(({ code }) => code)).toEqual(
      expect.arrayContaining(['gap', 'stuck', 'saturation', 'unreadable-cell']),
    );
  });

  it('has parts over their date, coming due, in date, and not assessed', async () => {
    const standings = (await rigOf(cutter.id)).flatMap(({ part }) => (part ? [part.standing] : []));
    const due = standings.map((standing) => standing.due);
    expect(due).toEqual(expect.arrayContaining(['overdue', 'due', 'in-date']));
    const assessed = standings.filter(({ assessment }) => assessment === 'assessed');
    expect(assessed.length).toBe(4);
    expect(standings.filter(({ assessment }) => assessment === 'not-assessed').length).toBeGreaterThan(1);
    // A date by fatigue, and a share of the allowance that a person would believe.
    expect(assessed.some(({ governingRule }) => governingRule === 'fatigue')).toBe(true);
    for (const { allowanceUsed } of assessed) {
      expect(allowanceUsed).toBeGreaterThan(0.001);
      expect(allowanceUsed).toBeLessThan(0.5);
    }
  });

  it('is told once, however often the service starts', async () => {
    const before = (await logsOf(cutter.id)).map(({ id, version }) => [id, version]);
    await tell();
    expect((await logsOf(cutter.id)).map(({ id, version }) => [id, version])).toEqual(before);
    expect(await logsOf(sloop.id)).toHaveLength(1);
  });
});

describe('the logs of the demo', () => {
  it('are a function of the first day, and small', () => {
    const bytesOf = (day: string) => [...cutterLogs(day), ...sloopLogs(day)].map((log) => log.bytes());
    const once = bytesOf('2026-12-01');
    expect(bytesOf('2026-12-01')).toEqual(once);
    expect(bytesOf('2026-12-02')).not.toEqual(once);
    expect(once.reduce((total, { length }) => total + length, 0)).toBeLessThan(1_000_000);
  });
});
