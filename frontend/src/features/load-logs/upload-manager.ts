import { DetailedError, Upload } from 'tus-js-client';
import { forgetUpload, rememberUpload } from './unfinished-uploads';
import type { FileFingerprint } from './file-fingerprint';

export type UploadPhase = 'sending' | 'waiting' | 'stopped' | 'failed' | 'finished';

/** Where one upload of this page stands. */
export interface UploadProgress {
  loadLogId: string;
  phase: UploadPhase;
  sentBytes: number;
  totalBytes: number;
  /** Why it waits or failed, in words. */
  message: string | null;
}

export interface UploadRequest {
  loadLogId: string;
  vesselId: string;
  file: File;
  fingerprint: FileFingerprint;
  /** Nothing of it was sent before, so there is nothing to ask the server about. */
  isNew: boolean;
}

const ENDPOINT = '/api/uploads';
/** Small enough that a cut connection costs seconds, large enough that requests do not count. */
const CHUNK_BYTES = 4 * 1024 * 1024;
const RETRY_DELAYS_MS = [0, 1000, 3000, 5000, 10_000, 20_000, 30_000];

/** A refusal the server will repeat, however often it is asked. */
function isFinalRefusal(status: number): boolean {
  return status >= 400 && status < 500 && status !== 409 && status !== 423 && status !== 429;
}

function refusalMessage(error: Error): string {
  const reply = error instanceof DetailedError ? error.originalResponse : null;
  if (reply === null || reply === undefined) {
    return 'The connection was lost. Nothing that arrived is lost with it: go on when you are back on line.';
  }
  try {
    const body: unknown = JSON.parse(reply.getBody());
    if (typeof body === 'object' && body !== null && 'message' in body && typeof body.message === 'string') {
      return body.message;
    }
  } catch {
    // Some refusals of the upload protocol are plain text.
  }
  return reply.getBody().trim() || `The server refused the upload (status ${reply.getStatus()}).`;
}

/**
 * The uploads of this browser tab. They live outside the pages, so that going to another page of the application does
 * not stop them; closing the tab does, and choosing the same file again goes on from the last byte that arrived.
 */
export class UploadManager {
  private readonly uploads = new Map<string, { upload: Upload; progress: UploadProgress }>();
  private readonly listeners = new Set<() => void>();

  subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  progressOf(loadLogId: string): UploadProgress | null {
    return this.uploads.get(loadLogId)?.progress ?? null;
  }

  /** Begins, or goes on with, the upload of a log that was announced to the server. */
  start({ loadLogId, vesselId, file, fingerprint, isNew }: UploadRequest): void {
    const running = this.uploads.get(loadLogId);
    if (running?.progress.phase === 'sending' || running?.progress.phase === 'waiting') return;
    rememberUpload({ ...fingerprint, loadLogId, vesselId });
    const upload = new Upload(file, {
      endpoint: ENDPOINT,
      // The upload's address is made of the log's own id, so it is known without any memory of this browser. Should
      // the server not know it after all, the client creates it.
      uploadUrl: isNew ? null : `${ENDPOINT}/${loadLogId}`,
      metadata: { loadLogId, filename: file.name },
      headers: { 'X-Requested-By': 'stayledger' },
      chunkSize: CHUNK_BYTES,
      retryDelays: RETRY_DELAYS_MS,
      storeFingerprintForResuming: false,
      onShouldRetry: (error) => {
        const status = error.originalResponse?.getStatus() ?? 0;
        if (isFinalRefusal(status)) return false;
        this.change(loadLogId, { phase: 'waiting', message: 'The connection was lost. Trying again.' });
        return true;
      },
      onProgress: (sentBytes, totalBytes) =>
        this.change(loadLogId, { phase: 'sending', sentBytes, totalBytes, message: null }),
      onSuccess: () => {
        forgetUpload(loadLogId);
        this.change(loadLogId, { phase: 'finished', sentBytes: file.size, message: null });
      },
      onError: (error) => this.change(loadLogId, { phase: 'failed', message: refusalMessage(error) }),
    });
    this.uploads.set(loadLogId, {
      upload,
      progress: { loadLogId, phase: 'sending', sentBytes: 0, totalBytes: file.size, message: null },
    });
    this.tell();
    upload.start();
  }

  /** Stops sending; what arrived stays on the server and the upload can go on. */
  async pause(loadLogId: string): Promise<void> {
    await this.uploads.get(loadLogId)?.upload.abort(false);
    this.change(loadLogId, { phase: 'stopped', message: null });
  }

  /** Goes on with an upload of this tab, from the last byte that arrived. */
  resume(loadLogId: string): void {
    const entry = this.uploads.get(loadLogId);
    if (!entry) return;
    this.change(loadLogId, { phase: 'sending', message: null });
    entry.upload.start();
  }

  /** Gives the upload up and has the server throw away what arrived. Works also for one begun elsewhere. */
  async discard(loadLogId: string): Promise<void> {
    const entry = this.uploads.get(loadLogId);
    if (entry) await entry.upload.abort(false);
    await Upload.terminate(`${ENDPOINT}/${loadLogId}`, {
      headers: { 'X-Requested-By': 'stayledger' },
      retryDelays: RETRY_DELAYS_MS.slice(0, 3),
    });
    this.uploads.delete(loadLogId);
    forgetUpload(loadLogId);
    this.tell();
  }

  private change(loadLogId: string, change: Partial<UploadProgress>): void {
    const entry = this.uploads.get(loadLogId);
    if (!entry) return;
    entry.progress = { ...entry.progress, ...change };
    this.tell();
  }

  private tell(): void {
    for (const listener of this.listeners) listener();
  }
}

export const uploadManager = new UploadManager();
