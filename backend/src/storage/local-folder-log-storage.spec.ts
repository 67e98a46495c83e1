import { createHash } from 'node:crypto';
import { mkdtemp, readdir, rm, utimes, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { LocalFolderLogStorage } from './local-folder-log-storage.js';

const key = {
  vesselId: '018f3a70-0000-7000-8000-000000000001',
  loadLogId: '018f3a70-0000-7000-8000-0000000000aa',
};

describe('LocalFolderLogStorage', () => {
  let root: string;
  let storage: LocalFolderLogStorage;

  beforeEach(async () => {
    root = await mkdtemp(join(tmpdir(), 'stayledger-storage-'));
    storage = new LocalFolderLogStorage(root);
  });
  afterEach(() => rm(root, { recursive: true, force: true }));

  it('grows a file piece by piece and completes it with its hash', async () => {
    await storage.begin(key);
    expect(await storage.received(key)).toEqual({ bytes: 0, complete: false });
    expect(await storage.append(key, 0, Readable.from([Buffer.from('time,kN\n')]))).toBe(8);
    expect(await storage.append(key, 8, Readable.from([Buffer.from('0,1\n')]))).toBe(12);

    const stored = await storage.complete(key);
    const expected = createHash('sha256').update('time,kN\n0,1\n').digest('hex');
    expect(stored).toEqual({ sizeBytes: 12, sha256: expected });
    expect(await readdir(join(root, key.vesselId))).toEqual([key.loadLogId]);
    expect(await storage.received(key)).toEqual({ bytes: 12, complete: true });
  });

  it('keeps what arrived before the source broke off', async () => {
    await storage.begin(key);
    async function* broken() {
      yield Buffer.from('12345');
      // A turn of the event loop lets the write reach the file, as the network would.
      await new Promise((resolve) => setTimeout(resolve, 20));
      throw new Error('connection lost');
    }
    await expect(storage.append(key, 0, Readable.from(broken()))).rejects.toThrow('connection lost');
    expect(await storage.received(key)).toEqual({ bytes: 5, complete: false });
    expect(await storage.append(key, 5, Readable.from([Buffer.from('678')]))).toBe(8);
  });

  it('answers the same when a file is begun or completed twice', async () => {
    await storage.begin(key);
    await storage.append(key, 0, Readable.from([Buffer.from('abc')]));
    await storage.begin(key);
    expect((await storage.received(key))?.bytes).toBe(3);
    const once = await storage.complete(key);
    expect(await storage.complete(key)).toEqual(once);
    await storage.begin(key);
    expect(await readdir(join(root, key.vesselId))).toEqual([key.loadLogId]);
  });

  it('completes a file that two complete at the same moment', async () => {
    await storage.begin(key);
    await storage.append(key, 0, Readable.from([Buffer.from('abc')]));
    const both = await Promise.all(Array.from({ length: 8 }, () => storage.complete(key)));
    // SHA-256 of "abc" as in FIPS 180-2, appendix B.1.
    const sha256 = 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad';
    expect(both).toEqual(Array.from({ length: 8 }, () => ({ sizeBytes: 3, sha256 })));
  });

  it('removes what is on its way without touching a complete file', async () => {
    await storage.begin(key);
    await storage.append(key, 0, Readable.from([Buffer.from('abc')]));
    await storage.complete(key);
    await writeFile(join(root, key.vesselId, `${key.loadLogId}.part`), 'stale');
    await storage.discardHalf(key);
    expect(await readdir(join(root, key.vesselId))).toEqual([key.loadLogId]);
  });

  it('lets nothing but ids into a path', async () => {
    for (const loadLogId of ['../x', 'a/b', '', '..', `${key.loadLogId}/../x`, `${key.loadLogId}\u0000`]) {
      await expect(storage.begin({ ...key, loadLogId })).rejects.toThrow('Not an id');
    }
    await expect(storage.received({ ...key, vesselId: '..' })).rejects.toThrow('Not an id');
  });

  it('lists half-received files by the age of their last byte, and complete ones apart', async () => {
    await storage.begin(key);
    const young = { ...key, loadLogId: '018f3a70-0000-7000-8000-0000000000bb' };
    await storage.begin(young);
    const done = { ...key, loadLogId: '018f3a70-0000-7000-8000-0000000000cc' };
    await storage.begin(done);
    await storage.complete(done);
    await writeFile(join(root, 'stray.txt'), 'not ours');
    const hourS = 3600;
    const twoHoursAgoS = 1_800_000_000 - 2 * hourS;
    await utimes(join(root, key.vesselId, `${key.loadLogId}.part`), twoHoursAgoS, twoHoursAgoS);
    await utimes(join(root, young.vesselId, `${young.loadLogId}.part`), 1_800_000_000, 1_800_000_000);

    expect(await storage.halfReceivedBefore((1_800_000_000 - hourS) * 1000)).toEqual([key]);
    expect(await storage.completedSince(0)).toEqual([done]);
    expect(await storage.completedSince(Date.now() + hourS * 1000)).toEqual([]);

    await storage.discard(key);
    expect(await storage.received(key)).toBeNull();
  });

  it('knows how much room is left', async () => {
    expect(await storage.freeBytes()).toBeGreaterThan(1_000_000);
  });
});
