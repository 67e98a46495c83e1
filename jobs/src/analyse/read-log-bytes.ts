import { createReadStream } from 'node:fs';
import { open } from 'node:fs/promises';
import type { Readable, TransformOptions } from 'node:stream';
import { createGunzip, type ZlibOptions } from 'node:zlib';

const READ_BYTES = 1 << 18;
/** Inflating goes on ahead, on a thread of its own, while what came before is counted. */
const INFLATING: ZlibOptions & TransformOptions = {
  chunkSize: READ_BYTES,
  readableHighWaterMark: 4 * READ_BYTES,
};

/**
 * The bytes of a log file, decompressed when they begin as gzip does, whatever the file is called.
 * The returned stream fails when the file cannot be read or its compressed data are cut short or changed.
 */
export async function readLogBytes(path: string): Promise<Readable> {
  const file = await open(path, 'r');
  const magic = Buffer.alloc(2);
  try {
    await file.read(magic, 0, 2, 0);
  } finally {
    await file.close();
  }
  const bytes = createReadStream(path, { highWaterMark: READ_BYTES });
  if (magic[0] !== 0x1f || magic[1] !== 0x8b) return bytes;
  const inflated = createGunzip(INFLATING);
  bytes.on('error', (error) => inflated.destroy(error));
  return bytes.pipe(inflated);
}
