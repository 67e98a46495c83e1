import { describe, expect, it } from 'vitest';
import { zoneClock } from './zone-clock';

describe('zoneClock', () => {
  it('knows offsets that are no whole hours and that change with the season', () => {
    // Chatham Islands: UTC+12:45 in winter, UTC+13:45 in summer.
    const chatham = zoneClock('Pacific/Chatham');
    expect(chatham.offsetMinutes(Date.parse('2026-06-15T00:00:00Z'))).toBe(765);
    expect(chatham.offsetMinutes(Date.parse('2026-12-15T00:00:00Z'))).toBe(825);
  });

  it('goes there and back', () => {
    const oslo = zoneClock('Europe/Oslo');
    for (const at of [
      '2026-01-01T00:00:00Z',
      '2026-03-29T00:59:00Z',
      '2026-03-29T01:01:00Z',
      '2026-07-01T12:34:56Z',
    ]) {
      expect(new Date(oslo.toInstant(oslo.toLocal(Date.parse(at)))).toISOString()).toBe(
        new Date(at).toISOString(),
      );
    }
  });
});
