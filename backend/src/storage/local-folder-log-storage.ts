import { createHash } from 'node:crypto';
import { createReadStream, createWriteStream } from 'node:fs';
import { mkdir, open, readdir, rename, rm, stat, statfs } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import type { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { StorageFullError } from '../common/errors/app-error.js';
import { type LogStorage, type ReceivedSoFar, type StorageKey, type StoredFile } from './log-storage.js';

const ID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;
const PART = '.part';
const READ_BUFFER_BYTES = 256 * 1024;

/**
 * Load log files in one folder: `<vessel id>/<load log id>`, with `.part` while they grow. A file without `.part`
 * is complete and durable, whatever happened in between: contents are flushed before the name changes, and the
 * folder after it.
 */
export class LocalFolderLogStorage implements LogStorage {
  constructor(private readonly root: string) {}

  async begin(key: StorageKey): Promise<void> {
    if (await this.received(key)) return;
    const path = this.partPath(key);
    await mkdir(dirname(path), { recursive: true, mode: 0o700 });
    const file = await open(path, 'a', 0o600);
    await file.close();
  }

  async received(key: StorageKey): Promise<ReceivedSoFar | null> {
    const complete = await sizeOf(this.finalPath(key));
    if (complete !== null) return { bytes: complete, complete: true };
    const growing = await sizeOf(this.partPath(key));
    return growing === null ? null : { bytes: growing, complete: false };
  }

  async append(key: StorageKey, offset: number, source: Readable): Promise<number> {
    const path = this.partPath(key);
    const target = createWriteStream(path, { flags: 'r+', start: offset });
    try {
      await pipeline(source, target);
    } catch (error) {
      if (hasCode(error, 'ENOSPC') || hasCode(error, 'EDQUOT')) {
        throw new StorageFullError(
          'The storage of the service is full. What arrived is kept: make room, then go on.',
          { cause: error },
        );
      }
      throw error;
    }
    return offset + target.bytesWritten;
  }

  async complete(key: StorageKey): Promise<StoredFile> {
    const finalPath = this.finalPath(key);
    if ((await sizeOf(finalPath)) === null) {
      try {
        await makeFinal(this.partPath(key), finalPath);
      } catch (error) {
        // Somebody else completed the same file in between: the sweep, or a client that asks again.
        if (!hasCode(error, 'ENOENT') || (await sizeOf(finalPath)) === null) throw error;
      }
    }
    return describe(finalPath);
  }

  read(key: StorageKey): Readable {
    return createReadStream(this.finalPath(key), { highWaterMark: READ_BUFFER_BYTES });
  }

  async localPath(key: StorageKey): Promise<string> {
    return this.finalPath(key);
  }

  async discard(key: StorageKey): Promise<void> {
    await rm(this.partPath(key), { force: true });
    await rm(this.finalPath(key), { force: true });
  }

  async discardHalf(key: StorageKey): Promise<void> {
    await rm(this.partPath(key), { force: true });
  }

  async halfReceivedBefore(instantMs: number): Promise<StorageKey[]> {
    const old: StorageKey[] = [];
    for (const key of await this.list((name) => name.endsWith(PART))) {
      const found = await stat(this.partPath(key)).catch(() => null);
      if (found && found.mtimeMs < instantMs) old.push(key);
    }
    return old;
  }

  async completedSince(instantMs: number): Promise<StorageKey[]> {
    const recent: StorageKey[] = [];
    for (const key of await this.list((name) => !name.endsWith(PART))) {
      // Renaming changes the status of a file, not its contents: ctime is the moment it became complete.
      const found = await stat(this.finalPath(key)).catch(() => null);
      if (found && found.ctimeMs >= instantMs) recent.push(key);
    }
    return recent;
  }

  async freeBytes(): Promise<number> {
    await mkdir(this.root, { recursive: true, mode: 0o700 });
    const found = await statfs(this.root);
    return found.bavail * found.bsize;
  }

  private async list(wanted: (name: string) => boolean): Promise<StorageKey[]> {
    const keys: StorageKey[] = [];
    for (const vesselId of (await names(this.root)).filter((name) => ID.test(name))) {
      for (const name of (await names(join(this.root, vesselId))).filter(wanted)) {
        const loadLogId = name.endsWith(PART) ? name.slice(0, -PART.length) : name;
        if (ID.test(loadLogId)) keys.push({ vesselId, loadLogId });
      }
    }
    return keys;
  }

  private partPath(key: StorageKey): string {
    return this.finalPath(key) + PART;
  }

  private finalPath({ vesselId, loadLogId }: StorageKey): string {
    // Nothing but ids of ours ever becomes part of a path, so no name can climb out of the folder.
    for (const id of [vesselId, loadLogId]) {
      if (!ID.test(id)) throw new Error(`Not an id that may name a file: ${JSON.stringify(id)}`);
    }
    return join(this.root, vesselId, loadLogId);
  }
}

async function makeFinal(partPath: string, finalPath: string): Promise<void> {
  const file = await open(partPath, 'r+');
  try {
    await file.sync();
  } finally {
    await file.close();
  }
  await rename(partPath, finalPath);
  await syncFolder(dirname(finalPath));
}

async function describe(path: string): Promise<StoredFile> {
  const hash = createHash('sha256');
  let sizeBytes = 0;
  for await (const chunk of createReadStream(path, { highWaterMark: READ_BUFFER_BYTES })) {
    hash.update(chunk as Buffer);
    sizeBytes += (chunk as Buffer).length;
  }
  return { sizeBytes, sha256: hash.digest('hex') };
}

async function syncFolder(path: string): Promise<void> {
  const folder = await open(path, 'r');
  try {
    await folder.sync();
  } finally {
    await folder.close();
  }
}

async function sizeOf(path: string): Promise<number | null> {
  try {
    return (await stat(path)).size;
  } catch (error) {
    if (hasCode(error, 'ENOENT')) return null;
    throw error;
  }
}

async function names(path: string): Promise<string[]> {
  try {
    return await readdir(path);
  } catch (error) {
    if (hasCode(error, 'ENOENT')) return [];
    throw error;
  }
}

function hasCode(error: unknown, code: string): boolean {
  return typeof error === 'object' && error !== null && 'code' in error && error.code === code;
}
