import { createReadStream } from 'node:fs';
import { damageOfSpectrum } from '@stayledger/shared/fatigue/damage/damage-of-spectrum';
import { CsvScanner, type CsvLayout } from '@stayledger/shared/fatigue/load-history/csv-scanner';
import { LoadLogCounter } from '@stayledger/shared/fatigue/load-history/load-log-counter';
import type { BenchRow } from './bench-row.js';
import { LOG_CONFIG } from './log-config.js';
import { makeLogFile } from './make-log-file.js';
import { alternate, busyMs } from './measure.js';
import { readFileBlocks } from './read-file-blocks.js';
import { expectSame, MODEL } from './slow-damage.js';
import { slowLogDamage } from './slow-log-damage.js';

const ROWS = 5_000_000;

const LAYOUT: CsvLayout = {
  delimiter: 44,
  decimalComma: false,
  lineEnd: 10,
  skipLines: 1,
  columns: [1, 2, 3, 4, 5, 6],
  time: { column: 0, format: 'iso', naiveOffsetMinutes: 0 },
};

/** CSV to spectra and damage, and the scan alone, against the plainest loop over the same bytes. */
export const csvRow: BenchRow = {
  values: [
    {
      name: 'csvOverByteLoop',
      what: 'time of 5,000,000 rows x 6 loads to damage over that of a naive byte loop',
      better: 'lower',
      reach: 2.6,
      ambition: 1.25,
    },
    {
      name: 'scanOverByteLoop',
      what: 'time of the scan alone over that of the byte loop',
      better: 'lower',
      reach: 1.6,
      ambition: 1,
    },
  ],
  async run() {
    const path = makeLogFile(ROWS);
    const damages = countFile(path);
    const slow = await slowLogDamage(path, ROWS);
    slow.forEach((damage, i) => expectSame(`load column ${i + 1}`, damages[i], damage));
    const { loop, scan, count } = await alternate(
      {
        loop: () => countLineEnds(path),
        scan: () => scanFile(path),
        count: () => countFile(path),
      },
      busyMs,
    );
    return { csvOverByteLoop: count / loop, scanOverByteLoop: scan / loop };
  },
};

/** What one writes first in Node to look at every byte of a file. */
async function countLineEnds(path: string): Promise<void> {
  let lines = 0;
  for await (const chunk of createReadStream(path) as AsyncIterable<Buffer>) {
    for (let i = 0; i < chunk.length; i++) if (chunk[i] === 10) lines++;
  }
  if (lines !== ROWS + 1) throw new Error(`${lines} lines instead of ${ROWS + 1}`);
}

function scanFile(path: string): void {
  let rows = 0;
  const trouble = () => {
    throw new Error('the scan stumbled');
  };
  const scanner = new CsvScanner(LAYOUT, (block) => (rows += block.rows), {
    unreadableCell: trouble,
    unreadableTime: trouble,
    shortRow: trouble,
    endlessRow: trouble,
  });
  readFileBlocks(path, (bytes) => scanner.push(bytes));
  scanner.finish();
  if (rows !== ROWS) throw new Error(`${rows} rows instead of ${ROWS}`);
}

function countFile(path: string): number[] {
  const counter = new LoadLogCounter(LOG_CONFIG);
  readFileBlocks(path, (bytes) => counter.push(bytes));
  return counter.finish().channels.map(({ spectrum }) => damageOfSpectrum(spectrum, MODEL).damage);
}
