import { describe, expect, it } from 'vitest';
import { highestMomentOfDay } from './highest-moment';

const at = (text: string): number => Date.parse(text);
const trace = {
  atMs: [at('2026-06-01T21:30:00Z'), at('2026-06-01T22:30:00Z'), at('2026-06-02T10:00:00Z')],
  lowKn: [0, 0, 0],
  highKn: [9, 4, 6],
};

describe('highestMomentOfDay', () => {
  it('keeps to the day of the vessel’s zone', () => {
    // 2 June begins in Oslo at 22:00 UTC on 1 June; the 9 kN half an hour before belong to 1 June.
    expect(highestMomentOfDay([trace], '2026-06-02', 'Europe/Oslo')).toBe(at('2026-06-02T10:00:00Z'));
    expect(highestMomentOfDay([trace], '2026-06-01', 'Europe/Oslo')).toBe(at('2026-06-01T21:30:00Z'));
  });

  it('takes the highest of all traces', () => {
    const other = { atMs: [at('2026-06-02T01:00:00Z')], lowKn: [0], highKn: [7] };
    expect(highestMomentOfDay([trace, other], '2026-06-02', 'Europe/Oslo')).toBe(at('2026-06-02T01:00:00Z'));
  });

  it('gives nothing for a day without data and for no day at all', () => {
    expect(highestMomentOfDay([trace], '2026-07-01', 'Europe/Oslo')).toBeNull();
    expect(highestMomentOfDay([trace], 'tomorrow', 'Europe/Oslo')).toBeNull();
  });
});
