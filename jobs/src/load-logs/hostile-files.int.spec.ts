import { gzipSync } from 'node:zlib';
import type { TestApp } from '@stayledger/backend/testing/test-app';
import type { LoadLogDto, LogMapping } from '@stayledger/shared/contracts/load-logs';
import {
  announceLog,
  createLoggedVessel,
  createTestService,
  type LoggedVessel,
  mappingTo,
  sendBytes,
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

const MIB = 1024 ** 2;
// 121 rows, one a minute, turn and turn about 4 and 14 kN; line 1 is the header.
const good = swingingCsv({ start: '2026-06-01T06:00:00Z', hours: 2, lowKn: 4, highKn: 14 });
const lines = good.split('\n');
const withRow = (row: string) => [...lines.slice(0, 50), row, ...lines.slice(51)].join('\n');
const packed = gzipSync(
  `time,cap_port_kN\n${Array.from({ length: 20_000 }, (_, i) => `2026-06-01T06:00:00Z,${Math.sin(i)}`).join('\n')}`,
);
const epoch = (format: 'epoch-s' | 'epoch-ms'): Partial<LogMapping> => ({
  time: { column: 'time', format, naiveOffsetMinutes: 0 },
});

interface Refused {
  name: string;
  contents: string | Buffer;
  mapping?: Partial<LogMapping>;
  code: string;
  /** Where it is and what mends it, as the message says. */
  says: string[];
}

const REFUSED: Refused[] = [
  { name: 'a header alone', contents: lines[0], code: 'no-rows', says: ['no rows', 'Export the log again'] },
  {
    name: 'a binary file without a single NUL',
    contents: Buffer.from(Array.from({ length: 5000 }, (_, i) => 1 + ((i * 7919) % 255))),
    code: 'not-a-table',
    says: ['Line 1 holds control characters', 'Export the log as .csv'],
  },
  {
    name: 'another delimiter than was stated',
    contents: `# recorder 7\n${good}`,
    mapping: { delimiter: ';' },
    code: 'cannot-be-read-so',
    says: ['cells of line 2 are parted by commas, not by semicolons', 'Choose that separator'],
  },
  {
    name: 'no such column, among very many with endless names',
    contents: `time,${Array.from({ length: 400 }, (_, i) => `${'n'.repeat(100)}${i}`).join(',')}\n1,2\n`,
    code: 'cannot-be-read-so',
    says: ['no column "cap_port_kN"', 'and 389 more', 'Match the columns anew'],
  },
  {
    name: 'a column that is there twice',
    contents: good.replace('cap_port_kN', 'cap_port_kN,cap_port_kN'),
    code: 'cannot-be-read-so',
    says: ['twice, as columns 2 and 3', 'Give each its own name'],
  },
  {
    name: 'milliseconds read as seconds',
    contents: 'time,cap_port_kN\n1782892800000,1\n1782892801000,2\n',
    mapping: epoch('epoch-s'),
    code: 'no-times',
    says: ['No row has a readable time', 'Choose another time column or format'],
  },
  {
    name: 'times before all calendars',
    contents: 'time,cap_port_kN\n0000-01-01T00:00:00Z,1\n0000-01-01T00:00:01Z,2\n',
    code: 'no-times',
    says: ['No row has a readable time'],
  },
  {
    name: 'a rate that leads beyond all calendars',
    contents: 'cap_port_kN\n1\n2\n3\n',
    mapping: { time: { rateHz: 0.0001, startAt: '2199-12-31T23:00:00.000Z' } },
    code: 'times-out-of-range',
    says: ['outside the years 1900 to 2199', 'Check both'],
  },
  {
    name: 'a start beyond all calendars',
    contents: 'cap_port_kN\n1\n2\n3\n',
    mapping: { time: { rateHz: 1, startAt: '9999-12-31T23:59:59.000Z' } },
    code: 'cannot-be-read-so',
    says: ['no instant between 1900 and 2199'],
  },
  {
    name: 'gzip cut short',
    contents: packed.subarray(0, packed.length - 3000),
    code: 'cut-short',
    says: ['Line 1', 'ends too early', 'copy it again'],
  },
  {
    name: 'gzip damaged in the middle',
    contents: Buffer.from(packed).fill(0xaa, packed.length - 3000, packed.length - 2900),
    code: 'damaged',
    says: ['Line ', 'damaged from here on', 'Pack the log again'],
  },
  {
    name: 'gzip with nothing behind its first bytes',
    contents: packed.subarray(0, 10),
    code: 'not-a-table',
    says: ['does not unpack', 'Compress it again'],
  },
  {
    name: 'a gzip bomb',
    contents: gzipSync(`time,cap_port_kN\n${'2026-06-01T06:00:00Z,1\n'.repeat(6_000_000)}`),
    code: 'unpacks-too-large',
    says: ['which no recording does', 'Unpack the file and look at it'],
  },
  {
    name: '10,000 columns',
    contents: `time,cap_port_kN${',c'.repeat(10_000)}\n${lines.slice(1).join('\n')}`,
    code: 'too-many-columns',
    says: ['Line 1', 'more than 1000 columns', 'Export the time and the load columns only'],
  },
  {
    name: 'a cell of 10 MB',
    contents: withRow(`2026-06-01T06:49:00.000Z,${'9'.repeat(10 * MIB)}`),
    code: 'line-too-long',
    says: ['Line 51, cell 1', 'longer than 1 MiB', 'Export the log again'],
  },
  {
    name: 'a NUL byte far down',
    contents: `${good.repeat(40)}2026-06-01T06:00:00.000Z,1\u00004\n`,
    code: 'not-text',
    // The header and 121 rows, forty times over, and then the row itself.
    says: [`Line ${40 * 122 + 1}, cell 2`, 'NUL byte', 'Export the log as .csv'],
  },
];

describe('a file that cannot be counted', () => {
  it.each(REFUSED)('says what, where and what mends it: $name', async ({ contents, mapping, code, says }) => {
    const log = await uploadLog(logged, contents, { mapping: mappingTo(logged.position.id, mapping) });
    expect(log).toMatchObject({ state: 'failed', failure: { code } });
    for (const words of says) expect(log.failure?.message).toContain(words);
    expect(log.failure?.message.length).toBeLessThan(1000);
    expect(log.failure?.message).not.toMatch(/\p{Cc}/u);
    // One look is enough; the same bytes give the same answer.
    if (log.job) expect(log.job).toMatchObject({ state: 'failed', attempts: 1 });
  });
});

interface Doubtful {
  name: string;
  contents: string;
  mapping?: Partial<LogMapping>;
  finding: { code: string; severity: string; line: number | null };
  says: string;
}

const DOUBTFUL: Doubtful[] = [
  {
    name: 'rows too short',
    contents: withRow('2026-06-01T06:49:00.000Z'),
    finding: { code: 'short-row', severity: 'warning', line: 51 },
    says: 'passed over',
  },
  {
    name: 'time that runs backwards',
    contents: [...lines.slice(0, 60), ...lines.slice(20, 60)].join('\n'),
    finding: { code: 'time-backwards', severity: 'serious', line: 61 },
    says: 'Check the clock of the recorder',
  },
  {
    name: 'a unit that makes loads exceed the breaking load tenfold',
    // 4 and 14 tonnes-force are 39 and 137 kN on a wire of 40 kN; 140 of them are 1,373 kN.
    contents: good.replaceAll(',14\n', ',140\n'),
    mapping: { channels: [{ column: 'cap_port_kN', unit: 'tf', positionId: '' }] },
    finding: { code: 'implausible-load', severity: 'serious', line: 3 },
    says: 'Exclude the interval if the load cannot have happened',
  },
  {
    name: 'an end in the middle of a row',
    contents: good.slice(0, -4),
    finding: { code: 'truncated', severity: 'warning', line: 122 },
    says: 'Check that the file was copied completely',
  },
  {
    name: 'one time from another age',
    contents: withRow('8026-06-01T06:49:00.000Z,14'),
    finding: { code: 'time-unreadable', severity: 'warning', line: 51 },
    says: 'with the day of the row before',
  },
];

describe('a file that is doubtful', () => {
  it.each(DOUBTFUL)(
    'is counted, with a finding that says where: $name',
    async ({ contents, mapping, finding, says }) => {
      const channels = mapping?.channels?.map((channel) => ({ ...channel, positionId: logged.position.id }));
      const log = await uploadLog(logged, contents, {
        mapping: mappingTo(logged.position.id, channels && { channels }),
      });
      expect(log.state).toBe('counted');
      const found = log.findings.find(({ code }) => code === finding.code);
      expect(found).toMatchObject(finding);
      expect(found?.action).toContain(says);
    },
  );

  it('never spoils a page or reaches the ledger, however large its loads', async () => {
    const victim = await createLoggedVessel(app);
    const monstrous = ['time,cap_port_kN', '2026-06-01T06:00:00Z,1e15', '2026-06-01T06:00:01Z,-1e15'];
    const rows = Array.from({ length: 60 }, (_, i) => `2026-06-01T06:01:${String(i).padStart(2, '0')}Z,1e15`);
    const log = await uploadLog(victim, [...monstrous, ...rows].join('\n'));
    expect(log.state).toBe('counted');
    await victim.agent.get(`/api/load-logs/${log.id}/review`).expect(200);
    const refused = await victim.agent.post(`/api/load-logs/${log.id}/post`).send({ version: log.version });
    expect(refused.status).toBe(409);
    expect(refused.body.message).toContain('is above the breaking load of 40.0 kN. Check the unit of column');
    await victim.agent.put(`/api/vessels/${victim.vessel.id}/usage-plan`).send({ sailingHoursPerYear: 400 });
    for (const page of [
      '/api/vessels',
      `/api/vessels/${victim.vessel.id}`,
      `/api/vessels/${victim.vessel.id}/rig`,
      `/api/parts/${victim.part.id}/life`,
      `/api/parts/${victim.part.id}/ledger`,
    ]) {
      const reply = await victim.agent.get(page);
      expect([page, reply.status]).toEqual([page, 200]);
    }
  });
});

describe('other people', () => {
  it('are served while hostile files are counted, in bounded memory', async () => {
    const other = await createLoggedVessel(app);
    const hostile = [
      gzipSync(`time,cap_port_kN\n${'2026-06-01T06:00:00Z,1\n'.repeat(6_000_000)}`),
      // A quotation that never ends, over as many lines as fit.
      Buffer.from(withRow(`2026-06-01T06:49:00.000Z,"${'9\n'.repeat(MIB)}`)),
    ];
    const before = process.memoryUsage().rss;
    const waiting: LoadLogDto[] = [];
    for (const bytes of hostile) {
      const log = await announceLog(logged, bytes.length);
      await sendBytes(logged.agent, log, bytes);
      waiting.push(log);
    }
    const log = await uploadLog(other, good, { fileName: 'honest.csv' });
    expect(log.state).toBe('counted');
    for (const { id } of waiting) await settled(logged.agent, id);
    expect(process.memoryUsage().rss - before).toBeLessThan(400 * MIB);
  });
});

describe('the name of a file', () => {
  it.each([
    ['climbs out of no folder', '../../../etc/passwd', '.._.._.._etc_passwd'],
    ['may be 300 characters long', `${'n'.repeat(296)}.csv`, `${'n'.repeat(296)}.csv`],
    ['may hold what breaks headers', 'a"\r\nX-Evil: 1;\u202e.csv', 'a___X-Evil: 1;_.csv'],
  ])('%s', async (_says, fileName, plain) => {
    const log = await uploadLog(logged, good, { fileName });
    expect(log).toMatchObject({ state: 'counted', fileName });
    const reply = await logged.agent.get(`/api/load-logs/${log.id}/file`).buffer(true).expect(200);
    expect(reply.headers['content-disposition']).toContain(`filename="${plain}"`);
    expect(reply.headers['x-evil']).toBeUndefined();
    expect(Buffer.from(reply.body).toString()).toBe(good);
  });

  it.each([
    ['longer than 300 characters', 'n'.repeat(301)],
    ['with a NUL in it', 'a\u0000.csv'],
    ['with half of a character in it', 'a\ud800.csv'],
    ['of nothing but blanks', '   '],
  ])('is refused at its field: %s', async (_what, fileName) => {
    const reply = await logged.agent
      .post(`/api/vessels/${logged.vessel.id}/load-logs`)
      .send({ fileName, sizeBytes: 10, mapping: mappingTo(logged.position.id) })
      .expect(400);
    expect(reply.body.fieldErrors).toHaveProperty('fileName');
  });
});
