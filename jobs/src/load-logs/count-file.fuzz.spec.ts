import { createReadStream, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { sniffLogFile } from '@stayledger/backend/storage/sniff-log-file';
import type { LoadLogConfig, LoadLogResult } from '@stayledger/shared/fatigue/load-history/load-log';
import type { LoadSpectrum } from '@stayledger/shared/fatigue/rainflow/load-spectrum';
import fc from 'fast-check';
import { BadFileError } from './bad-file-error.js';
import { countFile } from './count-file.js';

jest.setTimeout(120_000);

const SEED = 20_261_201;
let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'stayledger-fuzz-'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** The path a received file takes: judged by its first bytes, then counted. */
async function receiveAndCount(
  bytes: Buffer,
  config: LoadLogConfig,
): Promise<LoadLogResult | BadFileError | { refusal: string }> {
  const path = join(folder, 'log');
  writeFileSync(path, bytes);
  const sniffed = await sniffLogFile(createReadStream(path));
  if (sniffed.kind === 'other') return { refusal: sniffed.refusal };
  return countFile(path, config, () => undefined).catch((error: unknown) => {
    if (error instanceof BadFileError) return error;
    throw error;
  });
}

type Counts = Map<number, number>;
const add = (counts: Counts, range: number, times: number): void => {
  if (range > 0) counts.set(range, (counts.get(range) ?? 0) + times);
};
const sorted = (counts: Counts) => [...counts].sort(([a], [b]) => a - b);

/** Closed cycles, and halves of what is left open. */
function countsOf({ days, residue }: LoadSpectrum): Counts {
  const counts: Counts = new Map();
  for (const { cycles } of days) {
    cycles.low.forEach((low, i) => add(counts, cycles.high[i] - low, cycles.count[i]));
  }
  for (let i = 1; i < residue.length; i++) add(counts, Math.abs(residue[i] - residue[i - 1]), 0.5);
  return counts;
}

/** The three-point rule of ASTM E1049-85, 5.4.4, word by word on plain arrays: another algorithm than the engine's. */
function slowCounts(loads: readonly number[]): Counts {
  const peaks: number[] = [];
  for (const load of loads) {
    if (peaks.at(-1) === load) continue;
    const [a, b] = peaks.slice(-2);
    if (peaks.length >= 2 && (b - a) * (load - b) > 0) peaks.pop();
    peaks.push(load);
  }
  const counts: Counts = new Map();
  const points: number[] = [];
  for (const peak of peaks) {
    points.push(peak);
    while (points.length >= 3) {
      const [y1, y2, y3] = points.slice(-3);
      const x = Math.abs(y3 - y2);
      const y = Math.abs(y2 - y1);
      if (x < y) break;
      if (points.length === 3) {
        add(counts, y, 0.5);
        points.shift();
      } else {
        add(counts, y, 1);
        points.splice(-3, 2);
      }
    }
  }
  for (let i = 1; i < points.length; i++) add(counts, Math.abs(points[i] - points[i - 1]), 0.5);
  return counts;
}

type Cell =
  | { kind: 'load'; load: number; writing: 'plain' | 'quoted' | 'padded' | 'decimals' | 'exponent' | 'sign' }
  | { kind: 'empty' | 'word' | 'nan' | 'short' | 'blank-line' };

const cellArbitrary: fc.Arbitrary<Cell> = fc.oneof(
  {
    weight: 12,
    arbitrary: fc.record({
      kind: fc.constant('load' as const),
      load: fc.integer({ min: -20, max: 60 }),
      writing: fc.constantFrom('plain', 'plain', 'quoted', 'padded', 'decimals', 'exponent', 'sign'),
    }),
  },
  {
    weight: 1,
    arbitrary: fc.record({ kind: fc.constantFrom('empty', 'word', 'nan', 'short', 'blank-line') }),
  },
);

const dialectArbitrary = fc.record({
  delimiter: fc.constantFrom(',', ';', '\t', '|'),
  lineEnd: fc.constantFrom('\n', '\r\n'),
  lastLineEnds: fc.boolean(),
  bom: fc.boolean(),
  gzip: fc.boolean(),
  wider: fc.boolean(),
  preamble: fc.boolean(),
});
type Dialect = typeof dialectArbitrary extends fc.Arbitrary<infer T> ? T : never;

function written(cell: Extract<Cell, { kind: 'load' }>, decimalComma: boolean): string {
  const { load, writing } = cell;
  const point = decimalComma ? ',' : '.';
  switch (writing) {
    case 'quoted':
      return `"${load}"`;
    case 'padded':
      return `  ${load} `;
    case 'decimals':
      return `${load}${point}000`;
    case 'exponent':
      return `${load}e0`;
    case 'sign':
      return load >= 0 ? `+${load}` : String(load);
    default:
      return String(load);
  }
}

function fileOf(cells: readonly Cell[], dialect: Dialect): { text: Buffer; config: LoadLogConfig } {
  const { delimiter: d, lineEnd } = dialect;
  const decimalComma = d === ';';
  const tail = dialect.wider ? `${d}x` : '';
  const from = Date.parse('2026-06-01T00:00:00Z');
  const lines = [...(dialect.preamble ? ['recorder 7', ''] : []), `time${d}load${tail && `${d}note`}`];
  cells.forEach((cell, i) => {
    const time = new Date(from + i * 1000).toISOString();
    if (cell.kind === 'blank-line') lines.push('');
    else if (cell.kind === 'short') lines.push(time);
    else if (cell.kind === 'load') lines.push(`${time}${d}${written(cell, decimalComma)}${tail}`);
    else lines.push(`${time}${d}${{ empty: '', word: 'ERR', nan: 'NaN' }[cell.kind]}${tail}`);
  });
  const text = (dialect.bom ? '\ufeff' : '') + lines.join(lineEnd) + (dialect.lastLineEnds ? lineEnd : '');
  return {
    text: Buffer.from(text),
    config: {
      delimiter: d,
      decimalComma,
      time: { column: 'time', format: 'iso' },
      channels: [{ column: 'load', unit: 'kN', step: 1 }],
    },
  };
}

describe('receiving and counting', () => {
  it('counts what a slow reference counts, however the table is written', async () => {
    await fc.assert(
      fc.asyncProperty(
        // A last whole row, so that an end without a line end cannot be taken for a cut.
        fc.array(cellArbitrary, { minLength: 2, maxLength: 300 }),
        fc.integer({ min: 0, max: 9 }),
        dialectArbitrary,
        async (some, last, dialect) => {
          const ends: Cell = { kind: 'load', load: last, writing: 'plain' };
          const cells: Cell[] = [ends, ...some, ends];
          const { text, config } = fileOf(cells, dialect);
          const result = await receiveAndCount(dialect.gzip ? gzipSync(text) : text, config);
          if (!('channels' in result))
            throw new Error(`refused: ${JSON.stringify(result)} ${String(result)}`);
          const loads = cells.flatMap((cell) => (cell.kind === 'load' ? [cell.load] : []));
          const [{ samples, missing, minKn, maxKn, spectrum }] = result.channels;
          expect(result.rows).toBe(cells.filter(({ kind }) => kind !== 'blank-line').length);
          expect([samples, samples + missing]).toEqual([loads.length, result.rows]);
          expect([minKn, maxKn]).toEqual([Math.min(...loads), Math.max(...loads)]);
          expect(sorted(countsOf(spectrum))).toEqual(sorted(slowCounts(loads)));
        },
      ),
      { seed: SEED, numRuns: 150 },
    );
  });

  const mutation = fc.record({
    // Mostly behind the header, so that there is still something to count.
    at: fc.double({ min: 0.02, max: 1, noNaN: true }),
    remove: fc.integer({ min: 0, max: 40 }),
    insert: fc.oneof(
      fc.constant(new Uint8Array()),
      fc.uint8Array({ min: 1, maxLength: 12 }),
      fc
        .constantFrom(
          '"',
          ',',
          '\n',
          '\r',
          '""',
          ',,',
          '1e999',
          '-',
          '.',
          '\u0000',
          'NaN',
          '8.64e15',
          '9'.repeat(400),
        )
        .map((text) => new Uint8Array(Buffer.from(text))),
    ),
  });

  it('never crashes, hangs or gives nonsense on a damaged file', async () => {
    let counted = 0;
    let refused = 0;
    await fc.assert(
      fc.asyncProperty(
        fc.array(cellArbitrary, { minLength: 1, maxLength: 120 }),
        dialectArbitrary,
        fc.array(mutation, { minLength: 1, maxLength: 4 }),
        fc.constantFrom('iso', 'iso', 'iso', 'rate', 'rate', 'epoch-s', 'epoch-ms'),
        fc.constantFrom('text', 'text', 'text', 'packed'),
        async (cells, dialect, mutations, format, damaged) => {
          const { text, config } = fileOf(cells, dialect);
          const damage = (bytes: Buffer) =>
            mutations.reduce((whole, { at, remove, insert }) => {
              const from = Math.floor(at * whole.length);
              return Buffer.concat([whole.subarray(0, from), insert, whole.subarray(from + remove)]);
            }, bytes);
          const bytes =
            damaged === 'packed'
              ? damage(gzipSync(text))
              : dialect.gzip
                ? gzipSync(damage(text))
                : damage(text);
          const time: LoadLogConfig['time'] =
            format === 'rate' ? { rateHz: 1, startAt: '2026-06-01T00:00:00Z' } : { column: 'time', format };
          const begun = performance.now();
          const result = await receiveAndCount(bytes, { ...config, time });
          expect(performance.now() - begun).toBeLessThan(5000);
          if (!('channels' in result)) {
            refused++;
            const words = result instanceof BadFileError ? result.message : result.refusal;
            expect(words).toMatch(/[.!?]$/);
            expect(words.length).toBeLessThan(1000);
            return;
          }
          counted++;
          const [{ samples, missing, minKn, maxKn, spectrum }] = result.channels;
          expect(samples + missing).toBe(result.rows);
          expect(samples > 0 ? minKn <= maxKn : Number.isNaN(minKn)).toBe(true);
          expect(Number.isFinite(result.loggedHours) && result.loggedHours >= 0).toBe(true);
          for (const ms of [result.fromMs, result.toMs])
            expect(new Date(ms ?? NaN).getFullYear()).toBeLessThan(2201);
          expect([...countsOf(spectrum).values()].every((times) => times > 0 && Number.isFinite(times))).toBe(
            true,
          );
          expect(result.findings.every(({ message }) => message.length < 1000)).toBe(true);
        },
      ),
      { seed: SEED, numRuns: 400 },
    );
    // Both ways were walked, so neither branch above stands idle.
    expect(counted).toBeGreaterThan(20);
    expect(refused).toBeGreaterThan(20);
  });
});
