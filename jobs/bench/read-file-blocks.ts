import { closeSync, openSync, readSync } from 'node:fs';

/**
 * Reads a stretch of a file into one reused buffer, piece by piece.
 *
 * @param use is handed each piece; it is valid only during the call
 */
export function readFileBlocks(
  path: string,
  use: (bytes: Uint8Array) => void,
  from = 0,
  to = Infinity,
  blockBytes = 1 << 18,
): void {
  const buffer = new Uint8Array(blockBytes);
  const file = openSync(path, 'r');
  try {
    let at = from;
    while (at < to) {
      const read = readSync(file, buffer, 0, Math.min(blockBytes, to - at), at);
      if (read === 0) break;
      use(buffer.subarray(0, read));
      at += read;
    }
  } finally {
    closeSync(file);
  }
}
