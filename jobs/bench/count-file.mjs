import { closeSync, openSync, readSync } from 'node:fs';

/**
 * A process that counts one file and says what memory and time it took; without a file, bare Node. Reads the build
 * of the shared workspace: a loader for TypeScript would be measured along.
 */
const path = process.argv[2];
const damages = path === undefined ? [] : await countFile(path);
const { user, system } = process.cpuUsage();
process.stdout.write(
  JSON.stringify({
    residentMiB: process.resourceUsage().maxRSS / 1024,
    busyMs: (user + system) / 1000,
    damages,
  }),
);

async function countFile(file) {
  const { LoadLogCounter } = await import('@stayledger/shared/fatigue/load-history/load-log-counter');
  const { encodeSpectrum, decodeSpectrum } =
    await import('@stayledger/shared/fatigue/rainflow/spectrum-codec');
  const { astmCounts } = await import('@stayledger/shared/fatigue/rainflow/astm-counts');
  const { damageOfCounts } = await import('@stayledger/shared/fatigue/damage/damage-of-counts');
  const detail = JSON.parse(process.env.BENCH_DETAIL);
  const config = JSON.parse(process.env.BENCH_CONFIG);
  const counter = new LoadLogCounter(config);
  const buffer = new Uint8Array(1 << 18);
  const descriptor = openSync(file, 'r');
  for (;;) {
    const read = readSync(descriptor, buffer, 0, buffer.length, null);
    if (read === 0) break;
    counter.push(buffer.subarray(0, read));
  }
  closeSync(descriptor);
  // As the job does: each channel's spectrum is made, stored and let go.
  const stored = counter.finish().channels.map(({ spectrum }) => encodeSpectrum(spectrum));
  return stored.map((bytes) => damageOfCounts(astmCounts(decodeSpectrum(bytes)), detail));
}
