/** How much of a file is looked at before anything is sent: enough for the header and some hundred rows. */
export const HEAD_BYTES = 64 * 1024;

/** A compressed head unpacks to more than was read; this bounds what a hostile file can make of it. */
const UNPACKED_BYTES_MAX = 256 * 1024;

export interface FileHead {
  /** Text bytes, already unpacked when the file was compressed. */
  bytes: Uint8Array;
  compressed: boolean;
  /** The whole file is in `bytes`. */
  complete: boolean;
}

export class FileHeadError extends Error {
  override readonly name = 'FileHeadError';
}

function isGzip(bytes: Uint8Array): boolean {
  return bytes.length > 2 && bytes[0] === 0x1f && bytes[1] === 0x8b;
}

/** Unpacks as much as the bytes allow. A head is nearly always cut in the middle, so an early end is no fault. */
async function unpackHead(bytes: Uint8Array<ArrayBuffer>): Promise<Uint8Array> {
  const stream = new DecompressionStream('gzip');
  const writer = stream.writable.getWriter();
  // Both promises reject when the data are cut or broken; what was unpacked until then is read below.
  void writer.write(bytes).catch(() => undefined);
  void writer.close().catch(() => undefined);
  const reader = stream.readable.getReader();
  const chunks: Uint8Array[] = [];
  let length = 0;
  try {
    while (length < UNPACKED_BYTES_MAX) {
      const { done, value } = await reader.read();
      if (done) break;
      chunks.push(value);
      length += value.length;
    }
  } catch {
    // Cut or broken: the rows before that place still serve for recognition.
  }
  void reader.cancel().catch(() => undefined);
  const unpacked = new Uint8Array(length);
  let offset = 0;
  for (const chunk of chunks) {
    unpacked.set(chunk, offset);
    offset += chunk.length;
  }
  return unpacked;
}

/** Reads the beginning of a chosen file in the browser. Nothing leaves the machine. */
export async function readHead(file: Blob): Promise<FileHead> {
  if (file.size === 0) throw new FileHeadError('The file is empty. Choose the recording itself.');
  let raw: Uint8Array<ArrayBuffer>;
  try {
    raw = new Uint8Array(await file.slice(0, HEAD_BYTES).arrayBuffer());
  } catch {
    throw new FileHeadError(
      'The file cannot be read. It may have been moved or its disk taken out. Choose it again.',
    );
  }
  if (!isGzip(raw)) return { bytes: raw, compressed: false, complete: file.size <= raw.length };
  const bytes = await unpackHead(raw);
  if (bytes.length === 0) {
    throw new FileHeadError(
      'The file ends in .gz or begins like a gzip file but cannot be unpacked. Pack it again, or choose the plain .csv.',
    );
  }
  return { bytes, compressed: true, complete: file.size <= raw.length && bytes.length < UNPACKED_BYTES_MAX };
}
