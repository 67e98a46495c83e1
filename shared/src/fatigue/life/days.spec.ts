import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { addMonths, dayNumber, dayOfNumber } from './days.js';

describe('calendar days', () => {
  it.each([
    ['1970-01-01', 0],
    ['1970-01-02', 1],
    // 30 years of 365 days and 7 leap days.
    ['2000-01-01', 10_957],
    ['2000-03-01', 11_017],
    ['1969-12-31', -1],
  ])('%s is day %i', (day, number) => {
    expect(dayNumber(day)).toBe(number);
    expect(dayOfNumber(number)).toBe(day);
  });

  it.each(['2025-02-29', '2026-13-01', '2026-00-10', '26-01-01', '2026-1-1', '2026-01-01T00:00:00Z', ''])(
    'refuses "%s"',
    (day) => {
      expect(() => dayNumber(day)).toThrow(RangeError);
    },
  );

  it.each([
    ['2026-01-31', 1, '2026-02-28'],
    ['2024-01-31', 1, '2024-02-29'],
    ['2024-02-29', 12, '2025-02-28'],
    ['2024-02-29', 48, '2028-02-29'],
    ['2026-11-15', 2, '2027-01-15'],
    ['2026-06-30', 0, '2026-06-30'],
  ])('%s and %i months is %s', (day, months, expected) => {
    expect(addMonths(day, months)).toBe(expected);
  });

  it('goes there and back', () => {
    fc.assert(
      fc.property(fc.integer({ min: -200_000, max: 200_000 }), (number) => {
        expect(dayNumber(dayOfNumber(number))).toBe(number);
      }),
    );
  });
});
