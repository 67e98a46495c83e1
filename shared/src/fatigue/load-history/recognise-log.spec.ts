import { describe, expect, it } from 'vitest';
import { recogniseLog } from './recognise-log.js';
import { readColumnHeader } from './read-column-header.js';

const utf8 = (text: string) => {
  // Enough of UTF-8 for the letters used here.
  const bytes: number[] = [];
  for (const character of text) {
    const code = character.codePointAt(0) ?? 0;
    if (code < 0x80) bytes.push(code);
    else if (code < 0x800) bytes.push(0xc0 | (code >> 6), 0x80 | (code & 63));
    else bytes.push(0xe0 | (code >> 12), 0x80 | ((code >> 6) & 63), 0x80 | (code & 63));
  }
  return Uint8Array.from(bytes);
};

const codes = (text: string) => recogniseLog(utf8(text)).problems.map(({ code }) => code);

describe('recognising a load log', () => {
  it('finds delimiter, header, units, kinds, time and rate of a plain table', () => {
    const log = recogniseLog(
      utf8(
        'time,cap_port_kN,forestay [daN],aws_kts,awa (deg),heel,note\n' +
          '2026-05-01T10:00:00.0Z,12.5,1830,14.2,38,18,reef\n' +
          '2026-05-01T10:00:00.1Z,12.7,1842,14.1,39,18,\n' +
          '2026-05-01T10:00:00.2Z,12.9,1850,14.3,38,19,\n',
      ),
    );
    expect(log).toMatchObject({
      encoding: 'utf-8',
      lineEnd: 'lf',
      delimiter: ',',
      decimalComma: false,
      headerLine: 1,
      unitLine: 0,
      firstRowLine: 2,
      time: { index: 0, format: 'iso', hasOffset: true },
      sampleRateHz: 10,
      problems: [],
    });
    expect(log.columns.map(({ name, unit, kind }) => [name, unit, kind])).toEqual([
      ['time', 'unknown', 'time'],
      ['cap_port', 'kN', 'load'],
      ['forestay', 'daN', 'load'],
      ['aws', 'unknown', 'wind-speed'],
      ['awa', 'unknown', 'wind-angle'],
      ['heel', 'unknown', 'other'],
      ['note', 'unknown', 'other'],
    ]);
    expect(log.columns[1].firstValues).toEqual(['12.5', '12.7', '12.9']);
    expect(log.rows[0]).toHaveLength(7);
  });

  it('reads a table with semicolons, decimal commas, a remark, a unit row, a byte order mark and CRLF', () => {
    const log = recogniseLog(
      utf8(
        '\uFEFFBoat Ägir\r\n\r\nZeit;Want Bb;Vorstag\r\nUTC;kN;N\r\n2026-05-01 10:00:00;12,5;18300\r\n2026-05-01 10:00:01;12,7;18420,5\r\n',
      ),
    );
    expect(log).toMatchObject({
      encoding: 'utf-8-bom',
      lineEnd: 'crlf',
      delimiter: ';',
      decimalComma: true,
      headerLine: 3,
      unitLine: 4,
      firstRowLine: 5,
      time: { index: 0, format: 'iso', hasOffset: false },
      sampleRateHz: 1,
    });
    expect(log.columns.map(({ header, unit }) => [header, unit])).toEqual([
      ['Zeit', 'unknown'],
      ['Want Bb', 'kN'],
      ['Vorstag', 'N'],
    ]);
    expect(log.problems.map(({ code }) => code)).toEqual(['time-zone-unknown']);
  });

  it('tells seconds from milliseconds since 1970', () => {
    const timeOf = (a: string, b: string) => recogniseLog(utf8(`time\tload_N\n${a}\t5\n${b}\t6\n`));
    expect(timeOf('1782900930', '1782900931')).toMatchObject({
      delimiter: '\t',
      time: { format: 'epoch-s' },
      sampleRateHz: 1,
    });
    expect(timeOf('1782900930000', '1782900930050')).toMatchObject({
      time: { format: 'epoch-ms' },
      sampleRateHz: 20,
    });
  });

  it('asks instead of guessing an ambiguous unit', () => {
    for (const unit of ['t', 'T', 'ton', 'tons', 'kg', 'lbs', 'kn']) {
      const log = recogniseLog(utf8(`time,forestay [${unit}]\n2026-05-01T10:00:00Z,3\n`));
      expect(log.columns[1]).toMatchObject({ unit: 'unknown' });
    }
    expect(codes('time,forestay [t]\n2026-05-01T10:00:00Z,3\n')).toEqual(['unit-ambiguous']);
    expect(codes('time,forestay\n2026-05-01T10:00:00Z,3\n')).toEqual(['unit-unknown']);
  });

  it('says what is wrong with a table', () => {
    expect(codes('')).toEqual(['empty']);
    expect(codes('PK\u0003\u0000x')).toEqual(['not-text']);
    expect(recogniseLog(Uint8Array.of(0xff, 0xfe, 65, 0)).problems[0].code).toBe('encoding');
    expect(codes('time,load_kN\n')).toContain('no-rows');
    expect(codes('1,2\n3,4\n')).toContain('no-header');
    expect(codes('time,a_kN,a_kN\n2026-05-01T10:00:00Z,1,2\n')).toEqual(['column-twice']);
    expect(codes('when,load_kN\n5 past ten,1\n6 past ten,2\n')).toEqual(['no-time']);
    expect(codes('time,load_kN\n5 past ten,1\n6 past ten,2\n')).toContain('time-unreadable');
    expect(codes('time,heel\n2026-05-01T10:00:00Z,1\n')).toEqual(['no-load']);
    expect(codes('time,load_avg_kN\n2026-05-01T10:00:00Z,1\n')).toEqual(['averaged']);
  });

  it('reads one column without delimiter, and quoted cells over several lines', () => {
    expect(recogniseLog(utf8('load_kN\n1\n2\n'))).toMatchObject({ headerLine: 1, firstRowLine: 2 });
    const commas = recogniseLog(utf8('load_kN\n1,5\n2,5\n'));
    expect(commas).toMatchObject({ decimalComma: true, headerLine: 1 });
    expect(commas.columns).toHaveLength(1);
    const log = recogniseLog(
      utf8('time,load_kN,note\n2026-05-01T10:00:00Z,1,"two\nlines"\n2026-05-01T10:00:01Z,2,\n'),
    );
    expect(log.rows).toHaveLength(2);
    expect(log.rows[0][2]).toBe('two\nlines');
  });
});

describe('a column header', () => {
  it('gives up its unit in all usual spellings', () => {
    for (const header of [
      'cap_port_kN',
      'cap_port [kN]',
      'cap_port (kN)',
      'cap_port kN',
      'cap_port/kN',
      'cap_port-kN',
    ]) {
      expect(readColumnHeader(header)).toMatchObject({ name: 'cap_port', unit: 'kN' });
    }
    expect(readColumnHeader('V1 port [lbf]')).toMatchObject({ name: 'V1 port', unit: 'lbf' });
    expect(readColumnHeader('stay_N')).toMatchObject({ name: 'stay', unit: 'N' });
  });

  it('without one stays whole', () => {
    for (const header of ['cap_port', 'D1', 'N', '', 'load cell 3']) {
      expect(readColumnHeader(header)).toEqual({ name: header, unit: 'unknown', unitText: '', doubt: null });
    }
  });
});
