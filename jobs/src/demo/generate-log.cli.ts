import { createWriteStream } from 'node:fs';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { parseArgs } from 'node:util';
import { createGzip } from 'node:zlib';
import { loadHistory, type ChannelModel } from './load-history.js';
import { csvHeader, csvLine } from './log-csv.js';
import { SeededRandom } from './seeded-random.js';

/**
 * Writes an invented load log of any length:
 *   node dist/demo/generate-log.cli.js OUT.csv[.gz] [--hours 24] [--rate 10] [--channels 6] [--seed words]
 *     [--start 2026-06-01T06:00:00Z] [--wind 16] [--wave 1.2]
 */
const TEMPLATES: ChannelModel[] = [
  { column: 'cap_port_kN', side: 'port', dockKn: 9, at20KnotsKn: 14, perMetreKn: 3.2 },
  { column: 'cap_starboard_kN', side: 'starboard', dockKn: 9, at20KnotsKn: 14, perMetreKn: 3.2 },
  { column: 'lower_port_kN', side: 'port', dockKn: 7, at20KnotsKn: 9, perMetreKn: 2.4 },
  { column: 'lower_starboard_kN', side: 'starboard', dockKn: 7, at20KnotsKn: 9, perMetreKn: 2.4 },
  { column: 'forestay_kN', side: 'centre', dockKn: 11, at20KnotsKn: 10, perMetreKn: 2.8 },
  { column: 'backstay_kN', side: 'centre', dockKn: 10, at20KnotsKn: 8, perMetreKn: 2.1 },
];

function* lines(options: {
  channels: ChannelModel[];
  hours: number;
  rateHz: number;
  seed: string;
  startMs: number;
  windKn: number;
  waveHeightM: number;
}): Generator<string> {
  const style = { columns: options.channels.map(({ column }) => column), decimals: 2, wind: true };
  yield csvHeader(style);
  const outing = {
    startMs: options.startMs,
    hours: options.hours,
    conditions: { windKn: options.windKn, waveHeightM: options.waveHeightM, wavePeriodS: 6 },
  };
  let block = '';
  for (const row of loadHistory(options.channels, outing, options.rateHz, new SeededRandom(options.seed))) {
    block += csvLine(row, style);
    if (block.length < 1 << 16) continue;
    yield block;
    block = '';
  }
  yield block;
}

async function main(): Promise<void> {
  const { values, positionals } = parseArgs({
    allowPositionals: true,
    options: {
      hours: { type: 'string', default: '24' },
      rate: { type: 'string', default: '10' },
      channels: { type: 'string', default: '6' },
      seed: { type: 'string', default: 'long log' },
      start: { type: 'string', default: '2026-06-01T06:00:00Z' },
      wind: { type: 'string', default: '16' },
      wave: { type: 'string', default: '1.2' },
    },
  });
  const [path] = positionals;
  if (path === undefined) throw new Error('Name the file to write, for example long.csv.gz');
  const count = numberFrom('channels', values.channels, 1, TEMPLATES.length);
  const text = Readable.from(
    lines({
      channels: TEMPLATES.slice(0, count),
      hours: numberFrom('hours', values.hours, 0.01, 1e6),
      rateHz: numberFrom('rate', values.rate, 0.01, 1000),
      seed: values.seed,
      startMs: numberFrom('start', String(Date.parse(values.start)), 0, 8.64e15),
      windKn: numberFrom('wind', values.wind, 0, 80),
      waveHeightM: numberFrom('wave', values.wave, 0, 15),
    }),
  );
  const target = createWriteStream(path);
  if (path.endsWith('.gz')) await pipeline(text, createGzip(), target);
  else await pipeline(text, target);
}

function numberFrom(name: string, text: string, low: number, high: number): number {
  const value = Number(text);
  if (!(value >= low && value <= high))
    throw new Error(`--${name} must be from ${low} to ${high}, not ${text}`);
  return value;
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 2;
});
