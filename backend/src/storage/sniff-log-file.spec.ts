import { Readable } from 'node:stream';
import { gzipSync } from 'node:zlib';
import { sniffLogFile } from './sniff-log-file.js';

function sniff(bytes: Buffer | string) {
  return sniffLogFile(Readable.from([Buffer.from(bytes)]));
}

describe('sniffLogFile', () => {
  it('takes CSV text and gzipped CSV text, whatever the file is called', async () => {
    expect(await sniff('time;cap\n0;1,5\n')).toEqual({ kind: 'csv' });
    expect(await sniff(gzipSync('time,cap\n0,1\n'))).toEqual({ kind: 'csv-gz' });
  });

  it('judges a large gzip file by its beginning alone', async () => {
    const rows = Array.from({ length: 200_000 }, (_, i) => `${i},${Math.sin(i)}`).join('\n');
    const packed = gzipSync(rows);
    expect(packed.length).toBeGreaterThan(64 * 1024);
    expect(await sniff(packed)).toEqual({ kind: 'csv-gz' });
  });

  it.each([
    ['an empty file', '', 'empty'],
    ['a spreadsheet', 'PK\u0003\u0004rest', 'spreadsheet'],
    ['NMEA sentences', '$WIMWV,214.8,R,0.1,K,A*28\r\n', 'NMEA'],
    ['JSON', '{"updates":[]}', 'JSON'],
    ['a NUL byte in line 3', 'a,b\n1,2\n3,\u00004\n', 'Line 3 holds a NUL byte'],
    ['broken gzip', Buffer.from([0x1f, 0x8b, 8, 0, 1, 2, 3]), 'does not unpack'],
    ['gzipped binary', gzipSync(Buffer.from([1, 2, 0, 4])), 'NUL byte'],
    ['UTF-16 text', Buffer.from('\ufefftime', 'utf16le'), 'UTF-16'],
  ])('refuses %s and says what mends it', async (_name, bytes, words) => {
    const answer = await sniff(bytes);
    expect(answer).toEqual({ kind: 'other', refusal: expect.stringContaining(words) });
  });
});
