import { closeSync, openSync, readSync } from 'node:fs';
import { parentPort } from 'node:worker_threads';
import { LoadLogCounter } from '@stayledger/shared/fatigue/load-history/load-log-counter';
import { encodeSpectrum } from '@stayledger/shared/fatigue/rainflow/spectrum-codec';
import { LOG_CONFIG } from './log-config.js';
import { readFileBlocks } from './read-file-blocks.js';

/** A stretch of a log, from one line start to another; 0 is the start of the file. */
export interface CountRangeTask {
  path: string;
  from: number;
  to: number;
}

/** Spectra of the load columns, as stored. */
export interface CountRangeAnswer {
  spectra: Uint8Array[];
}

parentPort?.on('message', ({ path, from, to }: CountRangeTask) => {
  const counter = new LoadLogCounter(LOG_CONFIG);
  // A stretch from the middle is read under the header of the whole.
  if (from > 0) counter.push(headerOf(path));
  readFileBlocks(path, (bytes) => counter.push(bytes), from, to);
  const spectra = counter.finish().channels.map(({ spectrum }) => encodeSpectrum(spectrum));
  const answer: CountRangeAnswer = { spectra };
  parentPort?.postMessage(answer);
});

function headerOf(path: string): Uint8Array {
  const file = openSync(path, 'r');
  const bytes = new Uint8Array(4096);
  const read = readSync(file, bytes, 0, bytes.length, 0);
  closeSync(file);
  return bytes.slice(0, bytes.subarray(0, read).indexOf(10) + 1);
}
