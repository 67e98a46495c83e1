import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import type { LoadLogConfig } from '@stayledger/shared/fatigue/load-history/load-log';
import { spectrumOf } from '@stayledger/shared/fatigue/rainflow/spectrum-of';
import { countFile } from './count-file.js';

const config: LoadLogConfig = {
  time: { column: 'time', format: 'iso' },
  channels: [{ column: 'load', unit: 'kN', step: 0 }],
};
const HEADER = 'time,load\n';

function rows(count: number, load: (i: number) => number | string = (i) => (i * 7) % 11): string {
  const from = Date.parse('2026-06-01T00:00:00Z');
  return Array.from(
    { length: count },
    (_, i) => `${new Date(from + i * 1000).toISOString()},${load(i)}\n`,
  ).join('');
}

describe('countFile', () => {
  let folder: string;
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), 'stayledger-count-'));
  });
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  function count(contents: string | Buffer, override: Partial<LoadLogConfig> = {}) {
    const path = join(folder, 'log');
    writeFileSync(path, contents);
    return countFile(path, { ...config, ...override }, () => undefined);
  }

  it('counts plain and packed files alike, larger than any buffer', async () => {
    const text = HEADER + rows(40_000);
    expect(text.length).toBeGreaterThan(1024 * 1024);
    const plain = await count(text);
    const packed = await count(gzipSync(text));
    const inTwo = await count(
      Buffer.concat([gzipSync(text.slice(0, 700_001)), gzipSync(text.slice(700_001))]),
    );
    expect(plain.rows).toBe(40_000);
    const expected = spectrumOf(Array.from({ length: 40_000 }, (_, i) => (i * 7) % 11));
    for (const result of [plain, packed, inTwo]) {
      const { spectrum } = result.channels[0];
      expect([...spectrum.residue]).toEqual([...expected.residue]);
      expect(spectrum.turningPoints).toBe(expected.turningPoints);
    }
  });

  it('tells how many bytes were read', async () => {
    const path = join(folder, 'progress');
    const text = HEADER + rows(20_000);
    writeFileSync(path, text);
    const told: number[] = [];
    await countFile(path, config, (bytes) => told.push(bytes));
    expect(told.at(-1)).toBe(text.length);
    expect([...told].sort((a, b) => a - b)).toEqual(told);
  });

  const packedRows = gzipSync(HEADER + rows(5000, (i) => Math.sin(i) * 10));
  it.each([
    ['an empty file', '', 'empty', 'The file is empty.'],
    ['a header alone', HEADER, 'no-rows', 'header and no rows'],
    ['a NUL byte', `${HEADER}${rows(10)}\u0000`, 'not-text', 'NUL byte'],
    ['a column that is not there', 'time,other\n2026-06-01T00:00:00Z,1\n', 'cannot-be-read-so', 'load'],
    ['a column twice', 'time,load,load\n2026-06-01T00:00:00Z,1,2\n', 'cannot-be-read-so', 'load'],
    ['words in place of loads', HEADER + rows(30, () => 'ERR'), 'no-loads', 'ERR'],
    ['times nobody can read', 'time,load\nmorning,1\nnoon,2\n', 'no-times', 'time'],
    ['10,000 columns', `time,load,${'x,'.repeat(10_000)}\n1,2\n`, 'too-many-columns', '1000 columns'],
    ['a cell of 10 MB', `${HEADER}${rows(3)}"${'9'.repeat(10_000_000)}`, 'line-too-long', '1 MiB'],
    ['packed data cut short', packedRows.subarray(0, packedRows.length - 2000), 'cut-short', 'copy it again'],
    [
      'packed data changed in the middle',
      Buffer.from(packedRows).fill(0xaa, 1000, 1200),
      'damaged',
      'damaged',
    ],
  ])('refuses %s and says what mends it', async (_name, contents, code, words) => {
    await expect(count(contents)).rejects.toMatchObject({
      name: 'BadFileError',
      code,
      message: expect.stringContaining(words),
    });
  });

  it('stops a packed file that unpacks without end long before it is done', async () => {
    // Packed pieces one after the other are one packed file; 150 of these unpack to some 150 MB.
    const piece = gzipSync('2026-06-01T00:00:00Z,1\n'.repeat(45_000));
    const bomb = Buffer.concat([gzipSync(HEADER), ...Array.from({ length: 150 }, () => piece)]);
    expect(bomb.length).toBeLessThan(1_000_000);
    await expect(count(bomb)).rejects.toMatchObject({ code: 'unpacks-too-large' });
  });

  it('reads on where a recording stopped in the middle of a row', async () => {
    const result = await count(`${HEADER}${rows(100)}2026-06-01T00:0`);
    expect(result.rows).toBeGreaterThanOrEqual(100);
    expect(result.findings.map(({ code }) => code)).toContain('truncated');
  });
});
