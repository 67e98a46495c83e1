import { describe, expect, it } from 'vitest';
import { toCsv } from './to-csv';

const columns = [
  { key: 'name', title: 'Name', render: () => null, value: (row: Row) => row.name },
  { key: 'load', title: 'Load, kN', render: () => null, value: (row: Row) => row.load },
  { key: 'link', title: 'Link', render: () => null },
];
interface Row {
  name: string;
  load: number | null;
}

describe('toCsv', () => {
  it('quotes text, leaves numbers bare and nothing for what is not known', () => {
    expect(
      toCsv(
        [
          { name: 'Cap shroud, port', load: -3.2 },
          { name: 'He said "no"', load: null },
        ],
        columns,
      ),
    ).toBe('"Name","Load, kN"\r\n"Cap shroud, port",-3.2\r\n"He said ""no""",\r\n');
  });

  it.each(['=1+1', '+1', '-1', '@x', '\tx'])('keeps a spreadsheet from running %j', (name) => {
    expect(toCsv([{ name, load: 1 }], columns)).toContain(`"'${name}",1`);
  });
});
