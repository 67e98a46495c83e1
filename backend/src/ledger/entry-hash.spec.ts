import { createHash } from 'node:crypto';
import { canonicalJson } from './canonical-json.js';
import {
  type ChainedEntry,
  type EntryContent,
  entryHash,
  FIRST_HASH,
  firstBrokenEntry,
} from './entry-hash.js';

describe('canonicalJson', () => {
  it('spells a value one way whatever the order of its keys', () => {
    expect(canonicalJson({ b: [1, 'ä"', null], a: { d: true, c: 0.1 } })).toBe(
      '{"a":{"c":0.1,"d":true},"b":[1,"ä\\"",null]}',
    );
    expect(canonicalJson({ x: 1, y: 2 })).toBe(canonicalJson({ y: 2, x: 1 }));
  });

  it('refuses numbers that JSON would turn into null', () => {
    expect(() => canonicalJson({ damage: NaN })).toThrow(TypeError);
    expect(() => canonicalJson([Infinity])).toThrow(TypeError);
  });
});

describe('entryHash', () => {
  const content: EntryContent = {
    id: 'e1',
    vesselId: 'v',
    partId: 'p',
    detailId: 'd',
    sequence: 1,
    kind: 'recorded',
    loadLogId: 'l',
    reversesId: null,
    damage: 0.0125,
    curveId: 'c',
    curveVersion: 1,
    engineVersion: '1.0.0',
    basis: { hours: 12 },
    postedById: 'u',
    postedAt: '2026-07-01T10:00:00.000Z',
  };

  function chain(...damages: number[]): ChainedEntry[] {
    let previousHash = FIRST_HASH;
    return damages.map((damage, i) => {
      const entry = { ...content, id: `e${i + 1}`, sequence: i + 1, damage };
      const hash = entryHash(entry, previousHash);
      const chained = { ...entry, previousHash, hash };
      previousHash = hash;
      return chained;
    });
  }

  it('is SHA-256 over the canonical text, which anybody can repeat', () => {
    const text =
      '{"basis":{"hours":12},"curveId":"c","curveVersion":1,"damage":0.0125,"detailId":"d","engineVersion":"1.0.0",' +
      '"id":"e1","kind":"recorded","loadLogId":"l","partId":"p","postedAt":"2026-07-01T10:00:00.000Z",' +
      `"postedById":"u","previousHash":"${FIRST_HASH}","reversesId":null,"sequence":1,"vesselId":"v"}`;
    expect(entryHash(content, FIRST_HASH)).toBe(createHash('sha256').update(text).digest('hex'));
  });

  it('finds the first entry that was altered, left out or moved', () => {
    const entries = chain(0.1, 0.2, 0.3, 0.4);
    expect(firstBrokenEntry(entries)).toBeNull();
    expect(firstBrokenEntry([])).toBeNull();
    const altered = entries.map((entry) => (entry.id === 'e2' ? { ...entry, damage: 0.02 } : entry));
    expect(firstBrokenEntry(altered)?.id).toBe('e2');
    expect(firstBrokenEntry([entries[0], entries[2], entries[3]])?.id).toBe('e3');
    expect(firstBrokenEntry([entries[1], entries[0]])?.id).toBe('e2');
    // Whoever recomputes the hash of the altered entry breaks the one that follows.
    const rehashed = { ...altered[1], hash: entryHash(altered[1], altered[1].previousHash) };
    expect(firstBrokenEntry([entries[0], rehashed, entries[2], entries[3]])?.id).toBe('e3');
  });
});
