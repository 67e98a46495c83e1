import { createReadStream, createWriteStream, existsSync, renameSync } from 'node:fs';
import type { TransformOptions } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { createGunzip, createGzip, type ZlibOptions } from 'node:zlib';
import { damageOfSpectrum } from '@stayledger/shared/fatigue/damage/damage-of-spectrum';
import { LoadLogCounter } from '@stayledger/shared/fatigue/load-history/load-log-counter';
import type { BenchRow } from './bench-row.js';
import { LOG_CONFIG } from './log-config.js';
import { makeLogFile } from './make-log-file.js';
import { alternate } from './measure.js';
import { expectSame, MODEL } from './slow-damage.js';
import { slowLogDamage } from './slow-log-damage.js';

const ROWS = 1_000_000;
const PIECE = 1 << 18;
/** As the product reads: inflating goes on ahead while what came before is counted. */
const INFLATING: ZlibOptions & TransformOptions = { chunkSize: PIECE, readableHighWaterMark: 4 * PIECE };

/** A compressed log to damage; Node inflates on a thread of its own while this one counts. */
export const gzipRow: BenchRow = {
  values: [
    {
      name: 'gzOverInflate',
      what: 'time of .csv.gz to damage over inflating alone',
      better: 'lower',
      reach: 1.6,
      ambition: 1.1,
    },
  ],
  async run() {
    const plain = makeLogFile(ROWS);
    const path = `${plain}.gz`;
    if (!existsSync(path)) {
      await pipeline(createReadStream(plain), createGzip(), createWriteStream(`${path}.part`));
      renameSync(`${path}.part`, path);
    }
    let damages: number[] = [];
    const times = await alternate({
      inflate: async () => {
        let size = 0;
        for await (const chunk of inflated(path)) size += chunk.length;
        if (size === 0) throw new Error('nothing inflated');
      },
      count: async () => {
        const counter = new LoadLogCounter(LOG_CONFIG);
        for await (const chunk of inflated(path)) counter.push(chunk);
        damages = counter.finish().channels.map(({ spectrum }) => damageOfSpectrum(spectrum, MODEL).damage);
      },
    });
    const slow = await slowLogDamage(plain, ROWS);
    slow.forEach((damage, i) => expectSame(`load column ${i + 1}`, damages[i], damage));
    return { gzOverInflate: times.count / times.inflate };
  },
};

function inflated(path: string): AsyncIterable<Uint8Array> {
  return createReadStream(path, { highWaterMark: PIECE }).pipe(createGunzip(INFLATING));
}
