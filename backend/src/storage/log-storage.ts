import type { Readable } from 'node:stream';

/** Names one stored file. Both parts are ids of ours; what people call the file is a display string in the database. */
export interface StorageKey {
  vesselId: string;
  loadLogId: string;
}

/** What is known of a file once its last byte is safe on disk. */
export interface StoredFile {
  sizeBytes: number;
  sha256: string;
}

/** How much of a file is here. */
export interface ReceivedSoFar {
  bytes: number;
  complete: boolean;
}

/**
 * Where the files of load logs lie. A file grows by appending, is completed once, and never changes afterwards.
 * The local folder is one implementation; an object store would be another.
 */
export interface LogStorage {
  /** Begins an empty file; does nothing when it is already there, so a repeated announcement harms nobody. */
  begin(key: StorageKey): Promise<void>;
  /** null: never begun, or removed. */
  received(key: StorageKey): Promise<ReceivedSoFar | null>;
  /**
   * Writes on from the given offset and returns the new length. What arrived before the source broke off stays.
   * @throws StorageFullError when the device has no room
   */
  append(key: StorageKey, offset: number, source: Readable): Promise<number>;
  /** Makes the file final and durable. Safe to repeat after a crash in the middle. */
  complete(key: StorageKey): Promise<StoredFile>;
  read(key: StorageKey): Readable;
  /** Path of a complete file on this machine, for a counting thread that reads by itself. */
  localPath(key: StorageKey): Promise<string>;
  discard(key: StorageKey): Promise<void>;
  /** Removes what is on its way and leaves a complete file alone. */
  discardHalf(key: StorageKey): Promise<void>;
  /** Files on their way whose last byte came before the given instant. */
  halfReceivedBefore(instantMs: number): Promise<StorageKey[]>;
  /** Files that became complete at the given instant or later, for checks after a crash. */
  completedSince(instantMs: number): Promise<StorageKey[]>;
  freeBytes(): Promise<number>;
}

export const LOG_STORAGE = Symbol('LogStorage');
