import { closeSync, createReadStream, openSync, readSync, statSync } from 'node:fs';
import { createGunzip } from 'node:zlib';
import { type LoadLogConfig, LogConfigError } from '@stayledger/shared/fatigue/load-history/load-log';
import { isReadableInstant } from '@stayledger/shared/fatigue/load-history/readable-instant';
import { LoadLogCounter } from '@stayledger/shared/fatigue/load-history/load-log-counter';
import type { LoadLogResult } from '@stayledger/shared/fatigue/load-history/load-log';
import { BadFileError } from './bad-file-error.js';
import { placeInText } from './place-in-text.js';
import { BadBytesError, RawBytesGuard } from './raw-bytes-guard.js';

const BUFFER_BYTES = 256 * 1024;
/**
 * Unpacked, a log may be this many times its packed size. Loads pack some 3 to 10 times, a sensor that stands still
 * perhaps a hundred times; only a file made for the purpose packs a thousand times.
 */
const UNPACKED_RATIO_MAX = 200;
const UNPACKED_FREE_BYTES = 64 * 1024 ** 2;
/** Of a single log, unpacked. */
const UNPACKED_MAX_BYTES = 200 * 1024 ** 3;

/**
 * Reads a file from disk and counts it, plain or packed by what its first bytes say, in flat memory.
 *
 * @param onProgress called after each buffer with the bytes of the file read so far
 * @throws BadFileError when the file cannot be counted, whoever tries
 */
export async function countFile(
  path: string,
  config: LoadLogConfig,
  onProgress: (bytesRead: number) => void,
): Promise<LoadLogResult> {
  if (statSync(path).size === 0) throw new BadFileError('empty', 'The file is empty.');
  try {
    const counter = new LoadLogCounter(config);
    if (isGzip(path)) await readPacked(path, counter, onProgress);
    else readPlain(path, counter, onProgress);
    return checked(counter.finish());
  } catch (error) {
    if (error instanceof BadBytesError) throw await withPlace(error, path, config.delimiter ?? ',');
    if (error instanceof LogConfigError) throw new BadFileError('cannot-be-read-so', sentence(error.message));
    throw error;
  }
}

function readPlain(path: string, counter: LoadLogCounter, onProgress: (bytesRead: number) => void): void {
  const guard = new RawBytesGuard();
  const buffer = new Uint8Array(BUFFER_BYTES);
  const file = openSync(path, 'r');
  try {
    let position = 0;
    for (;;) {
      const read = readSync(file, buffer, 0, buffer.length, position);
      if (read === 0) return;
      position += read;
      const chunk = buffer.subarray(0, read);
      guard.check(chunk);
      counter.push(chunk);
      onProgress(position);
    }
  } finally {
    closeSync(file);
  }
}

async function readPacked(
  path: string,
  counter: LoadLogCounter,
  onProgress: (bytesRead: number) => void,
): Promise<void> {
  const guard = new RawBytesGuard();
  const source = createReadStream(path, { highWaterMark: BUFFER_BYTES });
  const gunzip = createGunzip({ chunkSize: BUFFER_BYTES });
  source.on('error', (error) => gunzip.destroy(error));
  let unpacked = 0;
  try {
    for await (const chunk of source.pipe(gunzip) as AsyncIterable<Buffer>) {
      unpacked += chunk.length;
      const limit = Math.min(UNPACKED_FREE_BYTES + UNPACKED_RATIO_MAX * source.bytesRead, UNPACKED_MAX_BYTES);
      if (unpacked > limit) {
        throw new BadFileError(
          'unpacks-too-large',
          `Packed into ${source.bytesRead} bytes are more than ${unpacked} bytes, which no recording does. Unpack the file and look at it, or export the log again.`,
        );
      }
      guard.check(chunk);
      counter.push(chunk);
      onProgress(source.bytesRead);
    }
  } catch (error) {
    throw unpackingFault(error, unpacked) ?? error;
  } finally {
    source.destroy();
    gunzip.destroy();
  }
}

/** The same fault with the line and cell it is in. */
async function withPlace(error: BadBytesError, path: string, delimiter: string): Promise<BadFileError> {
  const source = createReadStream(path, { highWaterMark: BUFFER_BYTES });
  const text = isGzip(path) ? source.pipe(createGunzip({ chunkSize: BUFFER_BYTES })) : source;
  source.on('error', (fault) => text.destroy(fault));
  try {
    const { line, cell } = await placeInText(text as AsyncIterable<Buffer>, error.atByte, delimiter);
    return new BadFileError(error.code, `Line ${line}, cell ${cell}: ${lowerFirst(error.message)}`);
  } finally {
    source.destroy();
    text.destroy();
  }
}

function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}

/** What zlib says of a damaged file, in words; null for any other fault. */
function unpackingFault(error: unknown, unpacked: number): BadBytesError | null {
  const code = typeof error === 'object' && error !== null && 'code' in error ? error.code : undefined;
  switch (code) {
    case 'Z_BUF_ERROR':
      return new BadBytesError(
        'cut-short',
        unpacked,
        'Here the packed file ends too early. It was probably cut while it was copied: copy it again and upload it anew.',
      );
    case 'Z_DATA_ERROR':
      return new BadBytesError(
        'damaged',
        unpacked,
        'The packed file is damaged from here on. Pack the log again and upload it anew.',
      );
    default:
      return null;
  }
}

function checked(result: LoadLogResult): LoadLogResult {
  if (result.rows === 0) {
    throw new BadFileError(
      'no-rows',
      'The file has a header and no rows. Export the log again with its data.',
    );
  }
  if (result.fromMs === null || result.toMs === null) {
    throw new BadFileError(
      'no-times',
      'No row has a readable time. Choose another time column or format, or state the rate.',
    );
  }
  if (!isReadableInstant(result.fromMs) || !isReadableInstant(result.toMs)) {
    throw new BadFileError(
      'times-out-of-range',
      `At the stated start and rate the ${result.rows} rows would lie outside the years 1900 to 2199. Check both.`,
    );
  }
  if (result.channels.every(({ samples }) => samples === 0)) {
    const [first] = result.findings.filter(({ code }) => code === 'unreadable-cell');
    throw new BadFileError(
      'no-loads',
      `None of the matched columns holds a single load. ${first ? `${first.message} ` : ''}Check the columns, the separator and the decimal sign.`,
    );
  }
  return result;
}

function isGzip(path: string): boolean {
  const magic = new Uint8Array(2);
  const file = openSync(path, 'r');
  try {
    readSync(file, magic, 0, 2, 0);
  } finally {
    closeSync(file);
  }
  return magic[0] === 0x1f && magic[1] === 0x8b;
}

function sentence(text: string): string {
  const ended = /[.!?]$/.test(text) ? text : `${text}.`;
  return ended.charAt(0).toUpperCase() + ended.slice(1);
}
