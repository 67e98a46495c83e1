import { HEAD_BYTES } from './read-head';

/** What tells one file from another without reading all of it. */
export interface FileFingerprint {
  fileName: string;
  sizeBytes: number;
  /** SHA-256 of the first 64 KiB as it lies on the disk, in hexadecimal. */
  headSha256: string;
}

export async function fingerprintOf(file: File): Promise<FileFingerprint> {
  const head = new Uint8Array(await file.slice(0, HEAD_BYTES).arrayBuffer());
  return { fileName: file.name, sizeBytes: file.size, headSha256: await sha256Hex(head) };
}

async function sha256Hex(bytes: Uint8Array<ArrayBuffer>): Promise<string> {
  // Browsers offer the digest only over TLS and on loopback. On plain HTTP the name and size must do.
  if (globalThis.crypto?.subtle === undefined) return '';
  const digest = new Uint8Array(await globalThis.crypto.subtle.digest('SHA-256', bytes));
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** Same name, size and beginning. The server still compares the hash of the whole file at the end. */
export function isSameFile(a: FileFingerprint, b: FileFingerprint): boolean {
  return a.fileName === b.fileName && a.sizeBytes === b.sizeBytes && a.headSha256 === b.headSha256;
}
