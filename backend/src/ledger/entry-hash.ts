import { createHash } from 'node:crypto';
import { type CanonicalValue, canonicalJson } from './canonical-json.js';

/** Everything a ledger entry says; the hash covers all of it. */
export interface EntryContent {
  id: string;
  vesselId: string;
  partId: string;
  detailId: string;
  sequence: number;
  kind: string;
  loadLogId: string | null;
  reversesId: string | null;
  damage: number;
  curveId: string;
  curveVersion: number;
  engineVersion: string;
  basis: CanonicalValue;
  postedById: string | null;
  /** ISO 8601 in UTC, to the millisecond. */
  postedAt: string;
}

export interface ChainedEntry extends EntryContent {
  previousHash: string;
  hash: string;
}

/** Stands where the first entry of a detail has no predecessor. */
export const FIRST_HASH = '0'.repeat(64);

/** Hash that ties an entry to all before it: SHA-256 over its canonical JSON with the hash of its predecessor. */
export function entryHash(content: EntryContent, previousHash: string): string {
  const said: CanonicalValue = {
    id: content.id,
    vesselId: content.vesselId,
    partId: content.partId,
    detailId: content.detailId,
    sequence: content.sequence,
    kind: content.kind,
    loadLogId: content.loadLogId,
    reversesId: content.reversesId,
    damage: content.damage,
    curveId: content.curveId,
    curveVersion: content.curveVersion,
    engineVersion: content.engineVersion,
    basis: content.basis,
    postedById: content.postedById,
    postedAt: content.postedAt,
    previousHash,
  };
  return createHash('sha256').update(canonicalJson(said)).digest('hex');
}

/**
 * First entry of a detail's chain that does not fit what stands before it; null when the whole chain holds.
 *
 * @param entries all entries of one detail, ascending by sequence
 */
export function firstBrokenEntry(entries: readonly ChainedEntry[]): ChainedEntry | null {
  let previousHash = FIRST_HASH;
  let sequence = 0;
  for (const entry of entries) {
    sequence += 1;
    const holds =
      entry.sequence === sequence &&
      entry.previousHash === previousHash &&
      entry.hash === entryHash(entry, previousHash);
    if (!holds) return entry;
    previousHash = entry.hash;
  }
  return null;
}
