import { readFileSync } from 'node:fs';
import { CsvScanner } from '@stayledger/shared/fatigue/load-history/csv-scanner';
import { parse as csvParse } from 'csv-parse/sync';
import Papa from 'papaparse';
import { inferSchema, initParser } from 'udsv';
import type { BenchRow } from './bench-row.js';
import { LOAD_COLUMNS, makeLogFile } from './make-log-file.js';
import { alternate, busyMs } from './measure.js';
import { expectSame } from './slow-damage.js';

const ROWS = 200_000;

/** The scan against CSV packages, each from the file's bytes in memory to the six loads as numbers. */
export const packagesRow: BenchRow = {
  values: [
    {
      name: 'scanOverPackage',
      what: 'speed of the scan over the fastest of csv-parse, papaparse and udsv',
      better: 'higher',
      reach: 4,
      ambition: 8,
    },
  ],
  async run() {
    const bytes = readFileSync(makeLogFile(ROWS));
    const sums: Record<string, number> = {};
    const times = await alternate(
      {
        scan: () => (sums.scan = scanSum(bytes)),
        csvParse: () => {
          const rows: string[][] = csvParse(bytes, { from_line: 2 });
          sums.csvParse = sumOf(rows);
        },
        papaparse: () => {
          const { data } = Papa.parse<string[]>(bytes.toString('latin1'), { skipEmptyLines: true });
          sums.papaparse = sumOf(data.slice(1));
        },
        udsv: () => {
          const text = bytes.toString('latin1');
          sums.udsv = sumOf(initParser(inferSchema(text)).stringArrs(text) as string[][]);
        },
      },
      busyMs,
    );
    for (const name of Object.keys(sums)) expectSame(name, sums.scan, sums[name]);
    return { scanOverPackage: Math.min(times.csvParse, times.papaparse, times.udsv) / times.scan };
  },
};

/** The strings of the load columns become numbers here: that is what they are wanted for. */
function sumOf(rows: string[][]): number {
  let sum = 0;
  for (const row of rows) for (let c = 1; c <= LOAD_COLUMNS.length; c++) sum += Number(row[c]);
  return sum;
}

function scanSum(bytes: Uint8Array): number {
  let sum = 0;
  const none = () => {
    throw new Error('the scan stumbled');
  };
  const scanner = new CsvScanner(
    {
      delimiter: 44,
      decimalComma: false,
      lineEnd: 10,
      skipLines: 1,
      columns: LOAD_COLUMNS.map((_, i) => i + 1),
      time: null,
    },
    ({ values, rows }) => {
      for (const column of values) for (let i = 0; i < rows; i++) sum += column[i];
    },
    { unreadableCell: none, unreadableTime: none, shortRow: none, endlessRow: none },
  );
  scanner.push(bytes);
  scanner.finish();
  return sum;
}
