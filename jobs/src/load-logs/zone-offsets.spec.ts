import { zoneOffsets } from './zone-offsets.js';

function offsetAt(zone: string, instant: string): number {
  const ms = Date.parse(instant);
  return zoneOffsets(zone).findLast(({ fromMs }) => fromMs <= ms)?.offsetMinutes ?? NaN;
}

describe('zoneOffsets', () => {
  it('changes at the second summer time begins and ends', () => {
    // European summer time begins and ends at 01:00 UTC on the last Sundays of March and October.
    expect(offsetAt('Europe/Oslo', '2026-03-29T00:59:59Z')).toBe(60);
    expect(offsetAt('Europe/Oslo', '2026-03-29T01:00:00Z')).toBe(120);
    expect(offsetAt('Europe/Oslo', '2026-10-25T00:59:59Z')).toBe(120);
    expect(offsetAt('Europe/Oslo', '2026-10-25T01:00:00Z')).toBe(60);
  });

  it('knows quarter hours, half hours west, and zones that never change', () => {
    expect(offsetAt('Pacific/Chatham', '2026-07-01T00:00:00Z')).toBe(12 * 60 + 45);
    expect(offsetAt('America/St_Johns', '2026-01-01T00:00:00Z')).toBe(-(3 * 60 + 30));
    expect(zoneOffsets('Etc/UTC')).toEqual([{ fromMs: Date.UTC(1990, 0, 1), offsetMinutes: 0 }]);
  });

  it('is ascending', () => {
    const starts = zoneOffsets('Europe/Oslo').map(({ fromMs }) => fromMs);
    expect([...starts].sort((a, b) => a - b)).toEqual(starts);
    // Two changes a year from 1990 to 2059.
    expect(starts).toHaveLength(1 + 2 * 70);
  });
});
