import { closeSync, openSync, readSync } from 'node:fs';
import { parentPort } from 'node:worker_threads';
import { LoadLogCounter } from '@stayledger/shared/fatigue/load-history/load-log-counter';

/**
 * A thread that counts stretches of a log, each from one line start to another, and answers with the spectra of the
 * columns as stored. Reads the build: loaders for TypeScript do not reach threads.
 */
parentPort.on('message', ({ path, from, to, config }) => {
  const counter = new LoadLogCounter(config);
  const file = openSync(path, 'r');
  const buffer = new Uint8Array(1 << 18);
  if (from > 0) {
    // A stretch from the middle is read under the header of the whole.
    const read = readSync(file, buffer, 0, 4096, 0);
    counter.push(buffer.slice(0, buffer.subarray(0, read).indexOf(10) + 1));
  }
  let at = from;
  while (at < to) {
    const read = readSync(file, buffer, 0, Math.min(buffer.length, to - at), at);
    if (read === 0) break;
    counter.push(buffer.subarray(0, read));
    at += read;
  }
  closeSync(file);
  parentPort.postMessage({ spectra: counter.finish().channels.map((channel) => channel.encodedSpectrum()) });
});
