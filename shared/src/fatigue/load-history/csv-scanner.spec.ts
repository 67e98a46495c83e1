import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CsvScanner, type CsvLayout } from './csv-scanner.js';

interface Scanned {
  values: number[][];
  timesMs: number[];
  lines: number[];
  trouble: string[];
}

const bytesOf = (text: string) => Uint8Array.from(text, (character) => character.charCodeAt(0));

function scan(text: string, layout: Partial<CsvLayout> = {}, chunkSizes: number[] = []): Scanned {
  const columns = layout.columns ?? [0];
  const scanned: Scanned = { values: columns.map(() => []), timesMs: [], lines: [], trouble: [] };
  const scanner = new CsvScanner(
    { delimiter: 44, decimalComma: false, lineEnd: 10, skipLines: 0, time: null, ...layout, columns },
    ({ rows, values, timesMs, lines }) => {
      values.forEach((column, i) => scanned.values[i].push(...column.subarray(0, rows)));
      scanned.timesMs.push(...timesMs.subarray(0, rows));
      scanned.lines.push(...lines.subarray(0, rows));
    },
    {
      unreadableCell: (place, line, cell) => scanned.trouble.push(`cell ${place} ${line} ${cell}`),
      unreadableTime: (line, cell) => scanned.trouble.push(`time ${line} ${cell}`),
      shortRow: (line, column, cut) => scanned.trouble.push(`${cut ? 'cut' : 'short'} ${line} ${column}`),
      endlessRow: (line) => scanned.trouble.push(`endless ${line}`),
    },
  );
  const bytes = bytesOf(text);
  let from = 0;
  for (let i = 0; from < bytes.length; i++) {
    const size = chunkSizes.length === 0 ? bytes.length : Math.max(1, chunkSizes[i % chunkSizes.length]);
    scanner.push(bytes.subarray(from, from + size));
    from += size;
  }
  scanner.finish();
  return scanned;
}

describe('numbers in cells', () => {
  // The language's own reading of a decimal is the reference: the double nearest to the text.
  const spellings = fc.oneof(
    fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e12, max: 1e12 }).map(String),
    fc.tuple(fc.integer(), fc.nat({ max: 999_999 })).map(([whole, part]) => `${whole}.${part}`),
    fc
      .tuple(fc.constantFrom('', '-', '+'), fc.stringMatching(/^\d{1,18}(\.\d{0,6})?$/))
      .map((pair) => pair.join('')),
    fc.tuple(fc.constantFrom('', '-', '+'), fc.stringMatching(/^\.\d{1,12}$/)).map((pair) => pair.join('')),
    fc
      .tuple(fc.integer(), fc.integer({ min: -330, max: 11 }))
      .map(([whole, power]) => `${whole / 1e6}e${power}`),
  );

  it('are read as the language reads them, wherever a sign, a point or an exponent stands', () => {
    fc.assert(
      fc.property(fc.array(spellings, { minLength: 1, maxLength: 20 }), (cells) => {
        const expected = cells.map(Number).map((value) => (Math.abs(value) <= 1e15 ? value : NaN));
        expect(scan(`${cells.join('\n')}\n`).values[0]).toEqual(expected);
        expect(scan(cells.map((cell) => `x,${cell},y`).join('\r\n'), { columns: [1] }).values[0]).toEqual(
          expected,
        );
        const commas = cells.map((cell) => cell.replace('.', ',')).join('\n');
        expect(scan(commas, { delimiter: 59, decimalComma: true }).values[0]).toEqual(expected);
      }),
      { numRuns: 400 },
    );
  });

  it('of exactly nine, ten, fifteen and seventeen digits keep all of them', () => {
    const cells = [
      '999999999',
      '4294967297',
      '9999999999',
      '123456789.012345',
      '0.12345678901234567',
      '-2147483648',
    ];
    expect(scan(cells.join('\n')).values[0]).toEqual(cells.map(Number));
  });

  it('may be quoted, padded with blanks or ended by a point', () => {
    expect(scan('"1.5"\n  2.5\n3.5  \n4.\n" -5 "\n+6\n').values[0]).toEqual([1.5, 2.5, 3.5, 4, -5, 6]);
  });

  it('are missing when the cell is empty or says NaN, without complaint', () => {
    const { values, trouble } = scan('1,\n,2\nnan,NaN\n"",""\n', { columns: [0, 1] });
    expect(values).toEqual([
      [1, NaN, NaN, NaN],
      [NaN, 2, NaN, NaN],
    ]);
    expect(trouble).toEqual([]);
  });

  it('are missing with a complaint when the cell is something else', () => {
    const cells = [
      '-',
      '--1',
      '1.2.3',
      '0x10',
      '1e400',
      'Infinity',
      '1,2',
      '12kN',
      '1 2',
      '+-3',
      '1e',
      '.',
      'e5',
      '1_000',
    ];
    const { values, trouble } = scan(`${cells.map((cell) => `"${cell}"`).join('\n')}\n`);
    expect(values[0].every((value) => Number.isNaN(value))).toBe(true);
    expect(trouble).toEqual(cells.map((cell, i) => `cell 0 ${i + 1} ${cell}`));
  });

  it('with a point are no numbers in a table with decimal commas', () => {
    expect(scan('1.5\n1,5\n', { delimiter: 59, decimalComma: true }).trouble).toEqual(['cell 0 1 1.5']);
  });
});

describe('rows', () => {
  it('end in LF, CRLF, CR alone or the end of the file', () => {
    expect(scan('1,2\n3,4', { columns: [1] }).values).toEqual([[2, 4]]);
    expect(scan('1,2\r\n3,4\r\n', { columns: [1] }).values).toEqual([[2, 4]]);
    expect(scan('1,2\r3,4\r', { columns: [1], lineEnd: 13 }).values).toEqual([[2, 4]]);
  });

  it('that are blank are none, and lines are counted all the same', () => {
    const { values, lines } = scan('h\n\n1\n\r\n\n2\n', { skipLines: 1 });
    expect(values[0]).toEqual([1, 2]);
    expect(lines).toEqual([3, 6]);
  });

  it('may be longer than the header, and end in a delimiter', () => {
    expect(scan('1,2,\n3,4,5,6\n', { columns: [0, 1] })).toMatchObject({
      values: [
        [1, 3],
        [2, 4],
      ],
      trouble: [],
    });
  });

  it('that are too short miss their last columns, and say so', () => {
    const { values, trouble } = scan('1,2,3\n4\n5,6\n7,8,9\n', { columns: [0, 1, 2] });
    expect(values).toEqual([
      [1, 4, 5, 7],
      [2, NaN, 6, 8],
      [3, NaN, NaN, 9],
    ]);
    expect(trouble).toEqual(['short 2 1', 'short 3 2']);
  });

  it('that break off with the file do not trust their last cell', () => {
    const { values, trouble } = scan('1,22,33\n4,5', { columns: [0, 1, 2] });
    expect(values).toEqual([
      [1, 4],
      [22, NaN],
      [33, NaN],
    ]);
    expect(trouble).toEqual(['cut 2 1']);
  });

  it('hold quoted cells with delimiters, quotes and line ends in them', () => {
    const { values, lines, trouble } = scan('"a,""b""\nc",1,"x\ny"\nz,2,"3"",\n"\n"q",3,\n', {
      columns: [1],
    });
    expect(values[0]).toEqual([1, 2, 3]);
    expect(lines).toEqual([1, 4, 6]);
    expect(trouble).toEqual([]);
  });

  it('with a quote that never closes are read as they stand', () => {
    const { values } = scan('1,"open\n2,b\n3,c\n', { columns: [0] });
    expect(values[0]).toEqual([1, 2, 3]);
  });

  it('longer than a MiB are given up', () => {
    const long = '7'.repeat((1 << 20) + 10);
    for (const sizes of [[], [65536]]) {
      const { values, trouble } = scan(`1,x\n2,${long}\n3,y\n`, { columns: [0] }, sizes);
      expect(values[0]).toEqual([1, 3]);
      expect(trouble).toEqual(['endless 2']);
    }
  });
});

describe('times', () => {
  const iso = (text: string, naiveOffsetMinutes = 0) =>
    scan(text, { columns: [1], time: { column: 0, format: 'iso', naiveOffsetMinutes } });

  it('are read like the language reads ISO instants, over days, months and leap years', () => {
    const instants = [
      '2024-02-28T23:59:59.999Z',
      '2024-02-29T00:00:00.000Z',
      '2024-12-31T23:59:59Z',
      '2025-01-01T00:00:00.5Z',
      '1970-01-01T00:00:00Z',
      '1969-12-31T23:59:59.250Z',
      '2000-03-01T12:00:00.123Z',
      '2026-07-01T10:15:30+02:00',
      '2026-07-01T10:15:30.25-09:30',
    ];
    const { timesMs, trouble } = iso(instants.map((instant) => `${instant},1\n`).join(''));
    expect(timesMs).toEqual(instants.map((instant) => Date.parse(instant)));
    expect(trouble).toEqual([]);
  });

  it('keep fractions of a millisecond', () => {
    expect(iso('2026-07-01T00:00:00.0005Z,1\n').timesMs).toEqual([Date.parse('2026-07-01T00:00:00Z') + 0.5]);
  });

  it('without a zone are in the clock they are said to be in', () => {
    const expected = Date.parse('2026-07-01T08:00:00Z');
    for (const text of [
      '2026-07-01T10:00:00',
      '2026-07-01 10:00:00.000',
      '2026-07-01 10:00',
      '2026/07/01 10:00:00',
    ]) {
      expect(iso(`${text},1\n`, 120).timesMs).toEqual([expected]);
    }
  });

  it('that do not exist are refused', () => {
    const cells = [
      '2025-02-29T00:00:00Z',
      '2026-13-01T00:00:00Z',
      '2026-01-01T25:00:00Z',
      '2026-01-01T10:60:00Z',
      'noon',
      '',
    ];
    const { timesMs, trouble } = iso(cells.map((cell) => `${cell},1\n`).join(''));
    expect(timesMs.every((time) => Number.isNaN(time))).toBe(true);
    expect(trouble).toEqual(cells.map((cell, i) => `time ${i + 1} ${cell}`));
  });

  it('may be seconds or milliseconds since 1970', () => {
    const time = (format: 'epoch-s' | 'epoch-ms') => ({ column: 0, format, naiveOffsetMinutes: 600 });
    expect(scan('1782900930.25,1\n', { columns: [1], time: time('epoch-s') }).timesMs).toEqual([
      1782900930250,
    ]);
    expect(scan('1782900930250,1\n', { columns: [1], time: time('epoch-ms') }).timesMs).toEqual([
      1782900930250,
    ]);
  });
});

describe('chunks', () => {
  const cell = fc.constantFrom(
    '1',
    '-2.5',
    '',
    '"3"',
    '"4,""x""\n"',
    'abc',
    '1e3',
    '12345678901',
    '"',
    '  7',
    '+.5',
  );
  const table = fc
    .array(fc.tuple(fc.array(cell, { minLength: 1, maxLength: 4 }), fc.constantFrom('\n', '\r\n', '\n\n')), {
      maxLength: 20,
    })
    .map((rows) => rows.map(([cells, end]) => cells.join(',') + end).join(''));

  it('of any sizes give the same rows, lines and complaints', () => {
    fc.assert(
      fc.property(
        table,
        fc.array(fc.integer({ min: 1, max: 9 }), { minLength: 1, maxLength: 5 }),
        (text, sizes) => {
          const layout = { columns: [0, 2], skipLines: 1 };
          expect(scan(text, layout, sizes)).toEqual(scan(text, layout));
        },
      ),
      { numRuns: 1500 },
    );
  });

  it('do not matter over several blocks of rows', () => {
    const text = Array.from({ length: 10_000 }, (_, i) => `${i},${i / 4}\n`).join('');
    const whole = scan(text, { columns: [1] });
    expect(whole.values[0]).toEqual(Array.from({ length: 10_000 }, (_, i) => i / 4));
    expect(scan(text, { columns: [1] }, [999])).toEqual(whole);
  });
});
