import { describe, expect, it } from 'vitest';
import { CsvError, readCsv, writeCsv } from './csv-text.js';
import { readRigCsv, RIG_CSV_COLUMNS, writeRigCsv, type RigCsvPart } from './rig-csv.js';

const PART: RigCsvPart = {
  constructionId: 'strand-1x19-316',
  diameterMm: 8,
  certifiedBreakingLoadKn: 51.5,
  certificate: 'C 1',
  lengthM: 12.25,
  upperTerminal: 'swaged',
  lowerTerminal: 'mechanical',
  threadSize: '1/2-20 UNF',
  pinDiameterMm: 12.7,
  batch: 'B, "7"',
  fittedOn: '2024-04-01',
  notes: 'Two\nlines',
};

describe('CSV text', () => {
  it('keeps separators, quotes and line ends inside quotes, and counts lines', () => {
    expect(readCsv('a,b\r\n"x, ""y""","1\n2"\r\n\r\nlast,')).toEqual([
      { line: 1, cells: ['a', 'b'] },
      { line: 2, cells: ['x, "y"', '1\n2'] },
      { line: 5, cells: ['last', ''] },
    ]);
  });

  it('takes semicolons and a byte order mark', () => {
    expect(readCsv('\uFEFFa;b\n1,5;2').map(({ cells }) => cells)).toEqual([
      ['a', 'b'],
      ['1,5', '2'],
    ]);
  });

  it('says where a quote opens that never closes', () => {
    expect(() => readCsv('a,b\n1,2\n"open,3\n')).toThrow(expect.objectContaining({ line: 3 }));
  });

  it.each(['=1+1', '+cmd', '-cmd', '@sum', '\tx'])(
    'makes %j harmless to a spreadsheet and reads it back',
    (text) => {
      const written = writeCsv([['note'], [text]]);
      expect(written.split('\r\n')[1].replace(/^"/, '')).toMatch(/^'/);
      expect(readCsv(written)[1].cells[0]).toBe(text);
    },
  );

  it('leaves plain numbers alone', () => {
    expect(writeCsv([['-3.5', '+4', '']])).toBe('-3.5,+4,\r\n');
  });
});

describe('the file of a rig', () => {
  it('reads back what it wrote', () => {
    const rows = [
      { kind: 'cap-shroud', side: 'port' as const, mast: 'main', label: 'Cap shroud, port', part: PART },
      { kind: 'forestay', side: 'centre' as const, mast: 'fore', label: '=Forestay', part: null },
    ];
    const read = readRigCsv(writeRigCsv(rows));
    expect(read.map(({ line: _line, errors, ...row }) => (errors.length > 0 ? errors : row))).toEqual(rows);
  });

  it('is a template when there are no rows', () => {
    expect(writeRigCsv([])).toBe(`${RIG_CSV_COLUMNS.join(',')}\r\n`);
  });

  it('names every fault of a line, by line', () => {
    const text = [
      'place,side,construction,diameter_mm,length_m,fitted_on',
      'clothes-line,left,,,,',
      'forestay,centre,strand-1x19-316,8 mm,-3,1.4.2024',
      'backstay,centre,,8,,',
      'babystay,centre,rod,,,',
    ].join('\n');
    const rows = readRigCsv(text);
    expect(rows.map(({ line, errors }) => [line, errors.length])).toEqual([
      [2, 2],
      [3, 3],
      [4, 1],
      [5, 1],
    ]);
    expect(rows[1].errors.join(' ')).toContain('8 mm');
  });

  it('takes a decimal comma and fills in what is usual', () => {
    const [row] = readRigCsv('place;side;construction;diameter_mm\nforestay;centre;strand-1x19-316;7,94\n');
    expect(row).toMatchObject({ mast: 'main', label: '', errors: [] });
    expect(row.part).toMatchObject({ diameterMm: 7.94, upperTerminal: 'unknown', fittedOn: null });
  });

  it.each([
    ['', 'empty'],
    ['side,label\nport,x', '"place"'],
    ['place,side,colour\nforestay,centre,red', '"colour"'],
    ['place,side,side\nforestay,centre,port', 'twice'],
    [`place,side\n${'forestay,centre\n'.repeat(401)}`, '401'],
  ])('refuses a file it cannot read (%#)', (text, words) => {
    expect(() => readRigCsv(text)).toThrow(CsvError);
    expect(() => readRigCsv(text)).toThrow(words);
  });
});
