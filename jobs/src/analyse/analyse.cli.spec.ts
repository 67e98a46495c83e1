import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { gzipSync } from 'node:zlib';
import { analyseLog } from './analyse-log';
import { readConfig } from './read-config';
import { readLogBytes } from './read-log-bytes';

const COMMAND = resolve(__dirname, '../../../backend/setup/analyse.mjs');
/** The history of ASTM E1049-85 (2017), 5.4.4. */
const EXAMPLE = [-2, 1, -3, 5, -1, 3, -4, 4, -2];

let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'stayledger-analyse-'));
});
afterAll(() => rmSync(folder, { recursive: true }));

function written(name: string, content: string | Uint8Array): string {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
}

function run(...args: string[]): { status: number | null; stdout: string; stderr: string } {
  const env = { ...process.env, INIT_CWD: folder };
  return spawnSync(process.execPath, [COMMAND, ...args], { encoding: 'utf8', env });
}

interface ChannelSetting {
  [member: string]: unknown;
}

const config = (channel: ChannelSetting = {}, more: Record<string, unknown> = {}) =>
  JSON.stringify({
    format: 'csv',
    time: { rateHz: 1 },
    channels: [{ column: 'load', unit: 'kN', ...channel }],
    ...more,
  });

const table = (loads: (number | string)[]) => `load\n${loads.join('\n')}\n`;

async function* pieces(text: string): AsyncGenerator<Uint8Array> {
  yield Buffer.from(text);
}

const analyse = (text: string, settings: string) => analyseLog(readConfig(settings), pieces(text));

const SEGMENTS = [
  { above: 5, m: 3, log10a: 6 },
  { above: 4, m: 5, log10a: 7 },
];
const detail = (more: Record<string, unknown> = {}) => ({
  details: [{ name: 'wire', factor: 1, curve: { segments: SEGMENTS }, ...more }],
});

describe('the analyse command', () => {
  it('answers with one JSON document about the example of the standard, plain and compressed', () => {
    const settings = written('example.json', config(detail()));
    const plain = run(written('example.csv', table(EXAMPLE)), '--config', settings);
    expect(plain.stderr).toBe('');
    expect(plain.status).toBe(0);
    const answer: unknown = JSON.parse(plain.stdout);
    // Counts: the table of ASTM E1049-85, figure 6. Damage by hand: ranges of 5 and more on S^3/10^6
    // (0.5*216 + 512 + 0.5*729 = 984.5), of 4 up to 5 on S^5/10^7 (1.5*1024 = 1536), below 4 none.
    expect(answer).toEqual({
      rows: 9,
      channels: [
        {
          column: 'load',
          samples: 9,
          turningPoints: 9,
          closedCycles: 1,
          residue: [-2, 1, -3, 5, -4, 4, -2],
          counts: [
            [3, -0.5, 0.5],
            [4, -1, 0.5],
            [4, 1, 1],
            [6, 1, 0.5],
            [8, 0, 0.5],
            [8, 1, 0.5],
            [9, 0.5, 0.5],
          ],
          details: [{ name: 'wire', damage: expect.closeTo(984.5e-6 + 1536e-7, 15) as number }],
        },
      ],
      findings: [],
    });
    const half = table(EXAMPLE).length >> 1;
    const members = [table(EXAMPLE).slice(0, half), table(EXAMPLE).slice(half)].map((text) => gzipSync(text));
    written('example.csv.gz', Buffer.concat(members));
    // Paths are meant from where the command is given.
    expect(run('example.csv.gz', '--config', 'example.json').stdout).toBe(plain.stdout);
  });

  it('says what is wrong in one line and leaves with 2', () => {
    const log = written('log.csv', table(EXAMPLE));
    const good = written('good.json', config());
    const cut = written('cut.csv.gz', gzipSync(table(EXAMPLE)).subarray(0, 20));
    const refused: [string[], RegExp][] = [
      [[], /usage/],
      [[log, '--config', written('bad.json', '{')], /bad\.json.*JSON/],
      [[log, '--config', written('unit.json', config({ unit: 't' }))], /channels\[0\]\.unit/],
      [[log, '--config', written('column.json', config({ column: 'mast' }))], /no column "mast"/],
      [[join(folder, 'none.csv'), '--config', good], /none\.csv/],
      [[folder, '--config', good], /directory/],
      [[cut, '--config', good], /damaged/],
      [
        [log, '--config', written('mean.json', config(detail({ mean: { kind: 'goodman', ultimate: 1 } })))],
        /"load".*"wire".*mean of 1/,
      ],
    ];
    for (const [args, words] of refused) {
      const { status, stdout, stderr } = run(...args);
      expect([status, stdout]).toEqual([2, '']);
      expect(stderr).toMatch(words);
      expect(stderr.trimEnd().split('\n')).toHaveLength(1);
    }
  }, 60_000);

  it('reports a clock that runs backwards and goes on', async () => {
    const text = 'time,load\n2026-01-01T00:00:02Z,1\n2026-01-01T00:00:01Z,5\n2026-01-01T00:00:03Z,2\n';
    const { rows, findings } = await analyse(text, config({}, { time: { column: 'time' } }));
    expect(rows).toBe(3);
    expect(findings.map(({ code }) => code)).toEqual(['time-backwards']);
  });
});

describe('counting by the configuration', () => {
  it('rounds to the step, passes over missing samples and drops small ranges after merging', async () => {
    // Rounded to 0.5: 0, 2, 1.5, (missing), 3, 1, 1.5, -1; turning points 0, 2, 1.5, 3, 1, 1.5, -1.
    const text = 'a,load\n1,0.1\n1,2.2\n1,1.4\n1,\n1,3.1\n1,0.9\n1,NaN\n1,1.45\n1,-0.8\n';
    const counted = (await analyse(text, config({ step: 0.5 }))).channels[0];
    expect(counted).toMatchObject({ samples: 7, turningPoints: 7, closedCycles: 2, residue: [0, 3, -1] });
    const pairs = counted.counts.map(({ range, mean, count }) => [range, mean, count]);
    expect(pairs).toEqual([
      [0.5, 1.25, 1],
      [0.5, 1.75, 1],
      [3, 1.5, 0.5],
      [4, 1, 0.5],
    ]);
    const filtered = (await analyse(text, config({ step: 0.5, hysteresis: 1 }))).channels[0];
    expect(filtered).toMatchObject({ turningPoints: 7, closedCycles: 0, residue: [0, 3, -1] });
  });

  it('counts one column twice and gives each detail its own damage', async () => {
    const settings = JSON.stringify({
      time: { rateHz: 10 },
      channels: [
        { column: 'load', unit: 'kN', ...detail() },
        { column: 'load', unit: 'N', details: [] },
      ],
    });
    const { channels } = await analyse(table([0, 8, 0]), settings);
    expect(channels.map(({ residue }) => residue)).toEqual([
      [0, 8, 0],
      [0, 0.008, 0],
    ]);
  });

  it('credits no mean in compression and charges one in tension', async () => {
    const damageOf = async (loads: number[]) => {
      const settings = config(detail({ mean: { kind: 'goodman', ultimate: 20 } }));
      return (await analyse(table(loads), settings)).channels[0].details[0].damage;
    };
    // Range 8 about 10: S = 8 / (1 - 10/20) = 16, half of 16^3/10^6; about -10: half of 8^3/10^6.
    expect(await damageOf([6, 14])).toBeCloseTo(0.5 * 4096e-6, 15);
    expect(await damageOf([-14, -6])).toBeCloseTo(0.5 * 512e-6, 15);
  });

  it('takes the unit from the header when the configuration has none', async () => {
    const settings = JSON.stringify({ time: { rateHz: 1 }, channels: [{ column: 'load' }] });
    expect((await analyse('load [daN]\n100\n250\n', settings)).channels[0].residue).toEqual([1, 2.5]);
    expect((await analyse('load\n100\n250\n', settings)).channels[0].residue).toEqual([100, 250]);
    await expect(analyse('load [t]\n1\n2\n', settings)).rejects.toThrow(/must be configured/);
  });

  it('reads a compressed log by its content', async () => {
    const path = written('really-compressed.csv', gzipSync(table(EXAMPLE)));
    const { rows } = await analyseLog(readConfig(config()), await readLogBytes(path));
    expect(rows).toBe(9);
  });
});

describe('the configuration', () => {
  it.each([
    [config({}, { format: 'xlsx' }), /format must be "csv"/],
    [config({}, { time: {} }), /time must have either "column" or "rateHz"/],
    [config({}, { time: { rateHz: 0 } }), /time.rateHz must be above 0/],
    [config({}, { channels: [] }), /channels must name at least one/],
    [config({ step: -1 }), /channels\[0\].step must be 0 or more/],
    [config({ hysteresis: '1' }), /channels\[0\].hysteresis must be a number/],
    [config({ stepp: 1 }), /channels\[0\] has an unknown member "stepp"/],
    [config(detail({ factor: 0 })), /details\[0\].factor must be above 0/],
    [config(detail({ curve: { segments: [] } })), /segments must hold at least one/],
    [config(detail({ curve: { segments: [...SEGMENTS].reverse() } })), /from high to low/],
    [
      config(detail({ curve: { segments: [{ above: 0, m: 0, log10a: 1 }] } })),
      /segments\[0\].m must be above 0/,
    ],
    [config(detail({ mean: { kind: 'goodman' } })), /mean lacks "ultimate"/],
    [config(detail({ mean: { kind: 'gerber' } })), /mean.kind must be one of/],
    ['[]', /the configuration must be an object/],
  ])('%#: is refused with the place', (text, words) => {
    expect(() => readConfig(text)).toThrow(words);
  });
});
