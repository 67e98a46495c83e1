import { closeSync, openSync, readSync } from 'node:fs';

/**
 * A process that counts files one after the other and says what memory and time it took; without a file, bare Node.
 * Reads the build of the shared workspace: a loader for TypeScript would be measured along.
 */
const paths = process.argv.slice(2);
const engine = paths.length > 0 ? await loadEngine() : null;
// One file: what memory it takes when each channel's spectrum is made, stored and let go. Several: for comparison.
const keep = paths.length > 1;
const counted = paths.map((path) => count(path));
// The damages are for the comparison only; making them comes after the memory is read.
const residentMiB = process.resourceUsage().maxRSS / 1024;
const damageOf = paths.length > 0 ? await evaluator() : null;
process.stdout.write(
  JSON.stringify({
    residentMiB,
    busyMs: counted.map(({ busyMs }) => busyMs),
    damages: counted.map(({ stored }) => stored.map((bytes) => damageOf(bytes))),
  }),
);

async function loadEngine() {
  const { LoadLogCounter } = await import('@stayledger/shared/fatigue/load-history/load-log-counter');
  return LoadLogCounter;
}

function count(path) {
  const before = process.cpuUsage();
  const counter = new engine(JSON.parse(process.env.BENCH_CONFIG));
  const buffer = new Uint8Array(1 << 18);
  const descriptor = openSync(path, 'r');
  for (;;) {
    const read = readSync(descriptor, buffer, 0, buffer.length, null);
    if (read === 0) break;
    counter.push(buffer.subarray(0, read));
  }
  closeSync(descriptor);
  const stored = [];
  for (const channel of counter.finish().channels) {
    const bytes = channel.encodedSpectrum();
    if (keep) stored.push(bytes);
  }
  const { user, system } = process.cpuUsage(before);
  return { stored, busyMs: (user + system) / 1000 };
}

async function evaluator() {
  const { decodeSpectrum } = await import('@stayledger/shared/fatigue/rainflow/spectrum-codec');
  const { damageOfSpectrum } = await import('@stayledger/shared/fatigue/damage/damage-of-spectrum');
  const model = JSON.parse(process.env.BENCH_MODEL);
  return (bytes) => damageOfSpectrum(decodeSpectrum(bytes), model).damage;
}
