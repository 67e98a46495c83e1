import { createGunzip } from 'node:zlib';
import type { Readable } from 'node:stream';
import { firstBinaryByte } from '@stayledger/shared/fatigue/load-history/first-binary-byte';

const HEAD_BYTES = 64 * 1024;

/** What the first bytes of a file say it is. `refusal` tells people what is wrong and what mends it. */
export type SniffedFile = { kind: 'csv' | 'csv-gz' } | { kind: 'other'; refusal: string };

/** Judges a load log by its contents, whatever its name. Reads no more than the first 64 KiB. */
export async function sniffLogFile(file: Readable): Promise<SniffedFile> {
  const head = await firstBytes(file);
  if (head.length === 0) return { kind: 'other', refusal: 'The file is empty.' };
  if (head[0] === 0x1f && head[1] === 0x8b) {
    const text = await gunzipHead(head);
    if (text === null) {
      return {
        kind: 'other',
        refusal:
          'The file begins like a .gz file, but it does not unpack. Compress it again and upload it anew.',
      };
    }
    return refusalOf(text) ?? { kind: 'csv-gz' };
  }
  return refusalOf(head) ?? { kind: 'csv' };
}

function refusalOf(head: Buffer): SniffedFile | null {
  const named = KNOWN_OTHERS.find(({ magic }) => head.subarray(0, magic.length).equals(magic));
  if (named) {
    return {
      kind: 'other',
      refusal: `This is ${named.what}, not CSV text. Export the log as .csv or .csv.gz.`,
    };
  }
  const utf16 = (head[0] === 0xff && head[1] === 0xfe) || (head[0] === 0xfe && head[1] === 0xff);
  if (utf16) {
    return { kind: 'other', refusal: 'The text is stored as UTF-16. Save it as UTF-8 and upload it again.' };
  }
  const binary = firstBinaryByte(head);
  if (binary >= 0) {
    const line = head.subarray(0, binary).filter((byte) => byte === 0x0a).length + 1;
    const what = head[binary] === 0 ? 'a NUL byte' : 'control characters';
    return {
      kind: 'other',
      refusal: `Line ${line} holds ${what}, so this is not plain text. Export the log as .csv or .csv.gz.`,
    };
  }
  const first = head.toString('latin1', 0, 1);
  if (first === '$' || first === '!') {
    return {
      kind: 'other',
      refusal: 'This looks like recorded NMEA sentences. Export the load channels as columns of a .csv file.',
    };
  }
  if (first === '{' || first === '[') {
    return {
      kind: 'other',
      refusal: 'This looks like JSON. Export the load channels as columns of a .csv file.',
    };
  }
  return null;
}

const KNOWN_OTHERS = [
  { magic: Buffer.from('PK\u0003\u0004', 'latin1'), what: 'a ZIP archive or a spreadsheet' },
  { magic: Buffer.from('%PDF', 'latin1'), what: 'a PDF document' },
  { magic: Buffer.from([0xd0, 0xcf, 0x11, 0xe0]), what: 'an old spreadsheet file' },
  { magic: Buffer.from([0x89, 0x48, 0x44, 0x46]), what: 'an HDF file' },
  { magic: Buffer.from('MATLAB', 'latin1'), what: 'a MATLAB file' },
];

async function firstBytes(file: Readable): Promise<Buffer> {
  const parts: Buffer[] = [];
  let length = 0;
  for await (const chunk of file) {
    parts.push(chunk as Buffer);
    length += (chunk as Buffer).length;
    if (length >= HEAD_BYTES) break;
  }
  return Buffer.concat(parts).subarray(0, HEAD_BYTES);
}

/** First unpacked bytes; null when nothing at all can be unpacked. The head is cut, so an early end is no fault. */
function gunzipHead(head: Buffer): Promise<Buffer | null> {
  return new Promise((resolve) => {
    const parts: Buffer[] = [];
    let length = 0;
    const gunzip = createGunzip();
    const finish = () => {
      gunzip.destroy();
      resolve(length === 0 ? null : Buffer.concat(parts).subarray(0, HEAD_BYTES));
    };
    gunzip.on('data', (chunk: Buffer) => {
      parts.push(chunk);
      length += chunk.length;
      if (length >= HEAD_BYTES) finish();
    });
    gunzip.on('end', finish);
    gunzip.on('error', finish);
    gunzip.end(head);
  });
}
