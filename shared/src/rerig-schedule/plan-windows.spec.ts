import { describe, expect, it } from 'vitest';
import { planWindows } from './plan-windows.js';
import type { YardSeason } from './plan-windows.js';

const winter: YardSeason = {
  id: 'winter-2028',
  fromOn: '2028-10-01',
  untilOn: '2029-03-31',
  kinds: ['aloft', 'mast-out-ashore'],
};

describe('windows of a vessel', () => {
  it('are the seasons of the yard where nothing is closed', () => {
    expect(planWindows([winter], [], [])).toEqual({
      windows: [{ id: 'winter-2028', opensOn: '2028-10-01', closesOn: '2029-03-31', kinds: winter.kinds }],
      lostSeasonIds: [],
    });
  });

  // Closures of 20 December to 6 January and 3 to 10 January overlap and close 20 December to 10 January. Left are
  // 1 October to 19 December (80 days) and 11 January to 31 March (80 days in 2029): equal, so the first.
  it('take overlapping closures as one and keep the longest stretch', () => {
    const closures = [
      { fromOn: '2029-01-03', untilOn: '2029-01-10' },
      { fromOn: '2028-12-20', untilOn: '2029-01-06' },
    ];
    const [window] = planWindows([winter], closures, []).windows;
    expect([window.opensOn, window.closesOn]).toEqual(['2028-10-01', '2028-12-19']);
    const away = [{ fromOn: '2028-09-01', untilOn: '2028-10-02' }];
    const [later] = planWindows([winter], closures, away).windows;
    expect([later.opensOn, later.closesOn]).toEqual(['2029-01-11', '2029-03-31']);
  });

  it('are lost where the vessel is away throughout, or all but a few days', () => {
    const away = [{ fromOn: '2028-08-01', untilOn: '2029-03-28' }];
    expect(planWindows([winter], [], away)).toEqual({ windows: [], lostSeasonIds: ['winter-2028'] });
  });

  it('equal a count day by day', () => {
    const season: YardSeason = { ...winter, fromOn: '2028-10-01', untilOn: '2028-10-31' };
    for (let seed = 0; seed < 200; seed++) {
      const spans = [0, 1, 2].map((at) => {
        const from = 1 + ((seed * 7 + at * 11) % 29);
        return { from, until: Math.min(31, from + ((seed + at * 3) % 9)) };
      });
      const day = (number: number): string => `2028-10-${String(number).padStart(2, '0')}`;
      const closures = spans.map(({ from, until }) => ({ fromOn: day(from), untilOn: day(until) }));
      let best: [number, number] | null = null;
      for (let from = 1; from <= 31; from++) {
        for (let until = from; until <= 31; until++) {
          const isOpen = spans.every((span) => span.until < from || span.from > until);
          if (isOpen && (best === null || until - from > best[1] - best[0])) best = [from, until];
        }
      }
      const expected = best !== null && best[1] - best[0] + 1 >= 5 ? [[day(best[0]), day(best[1])]] : [];
      const { windows } = planWindows([season], closures, []);
      expect({ seed, windows: windows.map(({ opensOn, closesOn }) => [opensOn, closesOn]) }).toEqual({
        seed,
        windows: expected,
      });
    }
  });

  it('refuse a span that ends before it begins', () => {
    expect(() => planWindows([winter], [{ fromOn: '2029-01-05', untilOn: '2029-01-01' }], [])).toThrow(
      /ends before/,
    );
  });
});
