import { closeSync, openSync, readSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { Worker } from 'node:worker_threads';
import { damageOfSpectrum } from '@stayledger/shared/fatigue/damage/damage-of-spectrum';
import { mergeSpectra } from '@stayledger/shared/fatigue/rainflow/merge-spectra';
import { decodeSpectrum, encodeSpectrum } from '@stayledger/shared/fatigue/rainflow/spectrum-codec';
import type { BenchRow } from './bench-row.js';
import { LOG_CONFIG } from './log-config.js';
import { makeLogFile } from './make-log-file.js';
import { alternate } from './measure.js';
import { expectSame, MODEL } from './slow-damage.js';
import { slowLogDamage } from './slow-log-damage.js';

const ROWS = 5_000_000;

/** The file cut in two at a line end, each half counted on a thread of its own, the residues joined. */
export const threadsRow: BenchRow = {
  values: [
    {
      name: 'twoThreads',
      what: 'speed of two threads over one, the same spectra to the last bit',
      better: 'higher',
      reach: 1.5,
      ambition: 1.75,
    },
  ],
  async run() {
    const path = makeLogFile(ROWS);
    const { size } = statSync(path);
    const middle = lineStartFrom(path, Math.floor(size / 2));
    const workers = [startWorker(), startWorker()];
    let one: Uint8Array[] = [];
    let two: Uint8Array[] = [];
    const times = await alternate({
      one: async () => {
        one = await count(workers[0], { path, from: 0, to: size });
      },
      two: async () => {
        const [first, second] = await Promise.all([
          count(workers[0], { path, from: 0, to: middle }),
          count(workers[1], { path, from: middle, to: size }),
        ]);
        two = first.map((bytes, i) =>
          encodeSpectrum(mergeSpectra(decodeSpectrum(bytes), decodeSpectrum(second[i]))),
        );
      },
    });
    await Promise.all(workers.map((worker) => worker.terminate()));
    one.forEach((bytes, i) => {
      if (Buffer.compare(bytes, two[i]) !== 0)
        throw new Error(`load column ${i + 1} differs between one and two`);
    });
    const slow = await slowLogDamage(path, ROWS);
    two.forEach((bytes, i) => {
      expectSame(`load column ${i + 1}`, damageOfSpectrum(decodeSpectrum(bytes), MODEL).damage, slow[i]);
    });
    return { twoThreads: times.one / times.two };
  },
};

/** A stretch of a log, from one line start to another; 0 is the start of the file. */
interface CountRangeTask {
  path: string;
  from: number;
  to: number;
}

function startWorker(): Worker {
  return new Worker(join(__dirname, 'count-range.worker.mjs'), { execArgv: [] });
}

function count(worker: Worker, task: CountRangeTask): Promise<Uint8Array[]> {
  return new Promise((resolve, reject) => {
    worker.once('message', (answer: { spectra: Uint8Array[] }) => resolve(answer.spectra));
    worker.once('error', reject);
    worker.postMessage({ ...task, config: LOG_CONFIG });
  });
}

/** The first byte after the next line end. */
function lineStartFrom(path: string, at: number): number {
  const file = openSync(path, 'r');
  const bytes = new Uint8Array(4096);
  readSync(file, bytes, 0, bytes.length, at);
  closeSync(file);
  return at + bytes.indexOf(10) + 1;
}
