import { describe, expect, it } from 'vitest';
import { parseTimeText } from './parse-time-text.js';
import { isReadableInstant } from './readable-instant.js';

describe('isReadableInstant', () => {
  it('holds from 1900 to the end of 2199', () => {
    expect(isReadableInstant(Date.parse('1899-12-31T23:59:59.999Z'))).toBe(false);
    expect(isReadableInstant(Date.parse('1900-01-01T00:00:00Z'))).toBe(true);
    expect(isReadableInstant(Date.parse('2199-12-31T23:59:59.999Z'))).toBe(true);
    expect(isReadableInstant(Date.parse('2200-01-01T00:00:00Z'))).toBe(false);
    for (const none of [NaN, Infinity, -Infinity]) expect(isReadableInstant(none)).toBe(false);
  });

  it('keeps milliseconds read as seconds from becoming a date', () => {
    // 1,782,892,800,000 ms are July 2026; as seconds they would be the year 58,467.
    expect(parseTimeText('1782892800000', 'epoch-ms')).toEqual({ ms: 1_782_892_800_000, hasOffset: true });
    expect(parseTimeText('1782892800000', 'epoch-s')).toBeNull();
    expect(parseTimeText('0000-01-01T00:00:00Z', 'iso')).toBeNull();
    expect(parseTimeText('9999-12-31T23:59:59Z', 'iso')).toBeNull();
  });
});
