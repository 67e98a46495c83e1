import { describe, expect, it } from 'vitest';
import { timeTicks } from './time-ticks';

const iso = (from: string, to: string, zone: string, wanted: number): string[] =>
  timeTicks(Date.parse(from), Date.parse(to), zone, wanted).map(({ atMs }) => new Date(atMs).toISOString());

describe('timeTicks', () => {
  it('stands on whole hours of the zone, not of UTC', () => {
    // Kolkata is five and a half hours ahead: its whole hours are half hours in UTC.
    expect(iso('2026-06-01T10:10:00Z', '2026-06-01T13:10:00Z', 'Asia/Kolkata', 4)).toEqual([
      '2026-06-01T10:30:00.000Z',
      '2026-06-01T11:30:00.000Z',
      '2026-06-01T12:30:00.000Z',
    ]);
  });

  it('keeps midnights across the change of clocks', () => {
    // Oslo leaves summer time in the night to 25 October 2026: +02:00 before, +01:00 after.
    expect(iso('2026-10-24T00:00:00Z', '2026-10-27T00:00:00Z', 'Europe/Oslo', 4)).toEqual([
      '2026-10-24T22:00:00.000Z',
      '2026-10-25T23:00:00.000Z',
      '2026-10-26T23:00:00.000Z',
    ]);
  });

  it('falls back to the first of months for long spans', () => {
    expect(iso('2026-04-15T00:00:00Z', '2026-08-20T00:00:00Z', 'UTC', 6)).toEqual([
      '2026-05-01T00:00:00.000Z',
      '2026-06-01T00:00:00.000Z',
      '2026-07-01T00:00:00.000Z',
      '2026-08-01T00:00:00.000Z',
    ]);
  });

  it('marks the beginning of a day', () => {
    const ticks = timeTicks(Date.parse('2026-06-01T18:00:00Z'), Date.parse('2026-06-02T06:00:00Z'), 'UTC', 2);
    expect(ticks.map((tick) => tick.isDayStart)).toEqual([false, true, false]);
  });

  it('gives nothing for an empty span', () => {
    expect(timeTicks(5, 5, 'UTC', 4)).toEqual([]);
  });

  it('never gives many more than wanted', () => {
    for (const hours of [0.2, 1, 7, 30, 100, 900, 5000, 40_000]) {
      const from = Date.parse('2026-02-03T04:05:06Z');
      expect(timeTicks(from, from + hours * 3_600_000, 'Pacific/Chatham', 6).length).toBeLessThanOrEqual(7);
    }
  });
});
