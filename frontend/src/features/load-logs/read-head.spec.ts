import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { FileHeadError, HEAD_BYTES, readHead } from './read-head';

const text = (bytes: Uint8Array): string => new TextDecoder().decode(bytes);
const row = (index: number): string =>
  `2026-06-01T10:00:${String(index % 60).padStart(2, '0')}Z,${index % 97}.5\n`;
const rows = (count: number): string => Array.from({ length: count }, (_, index) => row(index)).join('');

describe('readHead', () => {
  it('reads a small plain file whole', async () => {
    const head = await readHead(new Blob(['time,cap_port\n', rows(3)]));
    expect(text(head.bytes)).toBe(`time,cap_port\n${rows(3)}`);
    expect(head).toMatchObject({ compressed: false, complete: true });
  });

  it('reads no more than the beginning of a large one', async () => {
    const head = await readHead(new Blob([rows(20_000)]));
    expect(head.bytes.length).toBe(HEAD_BYTES);
    expect(head.complete).toBe(false);
  });

  it('unpacks gzip by content, whatever the name', async () => {
    const head = await readHead(new Blob([gzipSync(`time,cap_port\n${rows(5)}`)]));
    expect(text(head.bytes)).toBe(`time,cap_port\n${rows(5)}`);
    expect(head).toMatchObject({ compressed: true, complete: true });
  });

  it('gives the rows before the cut when only the beginning of a gzip file is read', async () => {
    // Digits from a linear congruential generator pack badly, so that the packed file is longer than the head.
    let state = 7;
    const noise = Array.from({ length: 40_000 }, () => {
      state = (state * 1_103_515_245 + 12_345) % 2_147_483_648;
      return `${state}.${(state >> 3) % 1000}\n`;
    }).join('');
    const packed = gzipSync(noise);
    expect(packed.length).toBeGreaterThan(HEAD_BYTES);
    const head = await readHead(new Blob([packed]));
    expect(head.bytes.length).toBeGreaterThan(HEAD_BYTES / 2);
    expect(noise.startsWith(text(head.bytes))).toBe(true);
    expect(head.complete).toBe(false);
  });

  it('says what is wrong with an empty file and with one that only looks packed', async () => {
    await expect(readHead(new Blob([]))).rejects.toThrow('The file is empty');
    await expect(readHead(new Blob([new Uint8Array([0x1f, 0x8b, 1, 2, 3, 4])]))).rejects.toThrow(
      FileHeadError,
    );
  });
});
