import { isSameFile, type FileFingerprint } from './file-fingerprint';

/**
 * Uploads this browser began and has not finished, so that choosing the same file again goes on where the last
 * attempt stopped. Only names, sizes and our ids are kept; the bytes stay on the person's disk.
 */
export interface UnfinishedUpload extends FileFingerprint {
  loadLogId: string;
  vesselId: string;
}

const KEY = 'stayledger.unfinished-uploads';
const KEPT_MAX = 50;

/** The part of `Storage` used here; a browser with storage turned off has none, and then nothing is remembered. */
export type KeyValueStore = Pick<Storage, 'getItem' | 'setItem'>;

function browserStore(): KeyValueStore | null {
  try {
    return globalThis.localStorage ?? null;
  } catch {
    return null;
  }
}

/** What is stored may be of an older version of ours, or anybody's: only whole entries count. */
function isEntry(value: unknown): value is UnfinishedUpload {
  if (typeof value !== 'object' || value === null) return false;
  const entry = value as Partial<Record<keyof UnfinishedUpload, unknown>>;
  const texts = [entry.loadLogId, entry.vesselId, entry.fileName, entry.headSha256];
  return texts.every((text) => typeof text === 'string') && typeof entry.sizeBytes === 'number';
}

function readAll(store: KeyValueStore | null): UnfinishedUpload[] {
  try {
    const stored: unknown = JSON.parse(store?.getItem(KEY) ?? '[]');
    return Array.isArray(stored) ? stored.filter(isEntry) : [];
  } catch {
    return [];
  }
}

function writeAll(store: KeyValueStore | null, entries: UnfinishedUpload[]): void {
  try {
    store?.setItem(KEY, JSON.stringify(entries.slice(-KEPT_MAX)));
  } catch {
    // Full or forbidden: the upload itself does not depend on it.
  }
}

export function rememberUpload(entry: UnfinishedUpload, store = browserStore()): void {
  writeAll(store, [...readAll(store).filter((other) => other.loadLogId !== entry.loadLogId), entry]);
}

export function forgetUpload(loadLogId: string, store = browserStore()): void {
  writeAll(
    store,
    readAll(store).filter((entry) => entry.loadLogId !== loadLogId),
  );
}

/** The unfinished upload of this very file to this vessel, if this browser knows one. */
export function findUnfinishedUpload(
  vesselId: string,
  fingerprint: FileFingerprint,
  store = browserStore(),
): UnfinishedUpload | null {
  return (
    readAll(store).find((entry) => entry.vesselId === vesselId && isSameFile(entry, fingerprint)) ?? null
  );
}

/** What this browser remembers about an upload by its log, to check that the right file was chosen again. */
export function unfinishedUploadOf(loadLogId: string, store = browserStore()): UnfinishedUpload | null {
  return readAll(store).find((entry) => entry.loadLogId === loadLogId) ?? null;
}
