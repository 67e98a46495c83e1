import { gzipSync } from 'node:zlib';
import type { TestApp } from '@stayledger/backend/testing/test-app';
import {
  createLoggedVessel,
  createTestService,
  type LoggedVessel,
  mappingTo,
  settled,
  swingingCsv,
  uploadLog,
} from '../testing/log-journey.js';

// Each test waits for real threads and a real database, on whatever else the machine is doing.
jest.setTimeout(60_000);

let app: TestApp;
let logged: LoggedVessel;

beforeAll(async () => {
  app = await createTestService();
  logged = await createLoggedVessel(app);
});
afterAll(() => app?.close());

const good = swingingCsv({ start: '2026-06-01T06:00:00Z', hours: 2, lowKn: 4, highKn: 14 });

describe('a bad file', () => {
  it.each([
    ['a spreadsheet', Buffer.from('PK\u0003\u0004 and so on'), 'not-a-table', 'spreadsheet'],
    ['a header alone', 'time,cap_port_kN\n', 'no-rows', 'header and no rows'],
    ['the wrong column', good.replace('cap_port', 'cap_stb'), 'cannot-be-read-so', 'cap_port'],
    ['a late NUL byte', `${good.repeat(30)}\u0000`, 'not-text', 'NUL byte'],
    ['gzip cut short', gzipSync(good).subarray(0, 300), 'cut-short', 'too early'],
  ])('fails at once: %s', async (_name, contents, code, words) => {
    const log = await uploadLog(logged, contents);
    expect(log).toMatchObject({
      state: 'failed',
      failure: { code, message: expect.stringContaining(words) },
    });
    // A bad file is not tried again.
    if (log.job) expect(log.job).toMatchObject({ state: 'failed', attempts: 1, error: { code } });
    expect(log.sha256).toMatch(/^[0-9a-f]{64}$/);
    const review = await logged.agent.get(`/api/load-logs/${log.id}/review`).expect(200);
    expect(review.body).toMatchObject({ parts: [], traces: [] });
    expect(review.body.postDisabledReason).toContain('could not be counted');
    await logged.agent.post(`/api/load-logs/${log.id}/post`).send({ version: log.version }).expect(409);
  });

  it('can be read again in another way', async () => {
    const semicolons = good.replaceAll('.000Z,', '.000Z;').replace('time,', 'time;');
    const wrong = mappingTo(logged.position.id, { channels: [column('cap_starboard_kN')] });
    const failed = await uploadLog(logged, semicolons, { mapping: wrong });
    expect(failed.state).toBe('failed');
    const right = mappingTo(logged.position.id, { delimiter: ';' });
    await logged.agent
      .post(`/api/load-logs/${failed.id}/recount`)
      .send({ version: failed.version, mapping: right })
      .expect(200);
    const counted = await settled(logged.agent, failed.id);
    expect(counted).toMatchObject({ state: 'counted', failure: null, rows: 121 });
  });

  it('keeps its findings for people: time backwards, words, gaps', async () => {
    const lines = good.split('\n');
    const messy = [
      ...lines.slice(0, 40),
      ...lines.slice(80, 110),
      lines[50],
      '2026-06-01T08:00:00.000Z,ERR',
      '',
    ];
    const log = await uploadLog(logged, messy.join('\n'));
    expect(log.state).toBe('counted');
    const codes = log.findings.map(({ code }) => code);
    expect(codes).toEqual(expect.arrayContaining(['gap', 'time-backwards', 'unreadable-cell', 'rounding']));
    // 40 min are missing between the rows, so of two hours at most an hour and 20 min are logged.
    expect(log.loggedHours).toBeLessThan(1.4);
  });

  it('refuses mappings that cannot be meant, each at its field', async () => {
    const elsewhere = await createLoggedVessel(app);
    const announce = (channels: unknown[]) =>
      logged.agent
        .post(`/api/vessels/${logged.vessel.id}/load-logs`)
        .send({ fileName: 'x.csv', sizeBytes: 10, mapping: { ...mappingTo(logged.position.id), channels } })
        .expect(400);
    const twice = await announce([column('a'), column('a')]);
    expect(twice.body.fieldErrors['mapping.channels.1.column'][0]).toContain('used twice');
    expect(twice.body.fieldErrors['mapping.channels.1.positionId'][0]).toContain('Two columns');
    const time = await announce([column('time')]);
    expect(time.body.fieldErrors).toHaveProperty(['mapping.channels.0.column']);
    const foreign = await announce([{ ...column('a'), positionId: elsewhere.position.id }]);
    expect(foreign.body.fieldErrors['mapping.channels.0.positionId'][0]).toContain('not on the rig');
    const unit = await announce([{ ...column('a'), unit: 't' }]);
    expect(unit.body.fieldErrors).toHaveProperty(['mapping.channels.0.unit']);
  });
});

function column(name: string) {
  return { column: name, unit: 'kN' as const, positionId: logged.position.id };
}
