import { describe, expect, it } from 'vitest';
import { answeringGroups } from './answering-groups.js';
import { bandRates, type BandRecord } from './band-rates.js';
import { carriedIn } from './carried-in.js';
import { excludedInterval } from './excluded-interval.js';
import { plannedUse } from './planned-use.js';
import { postUnlogged } from './post-unlogged.js';
import { powerLawRate } from './power-law-rate.js';
import { useByShare, yearProfile } from './year-profile.js';

const record = (band: number | null, hours: number, damage: number, cycles = 1000 * hours): BandRecord => ({
  state: 'sailing',
  band,
  windSpeed: band === null ? null : 4 * band,
  hours,
  cycles,
  damage,
});

describe('damage per hour by state and wind', () => {
  it('merges a thin band with the one above, the last one with the one below', () => {
    const rates = bandRates([record(4, 10, 1), record(3, 1.9, 0.019), record(5, 8, 4), record(6, 0.5, 1)]);
    expect(rates).toMatchObject([
      { fromBand: 3, toBand: 4, hours: 11.9, thin: false },
      { fromBand: 5, toBand: 6, hours: 8.5, thin: false },
    ]);
    // (1 + 0.019) / 11.9 and (4 + 1) / 8.5
    expect(rates[0].damagePerHour).toBeCloseTo(1.019 / 11.9, 12);
    expect(rates[1].damagePerHour).toBeCloseTo(5 / 8.5, 12);
  });

  it('counts 500 cycles as the other bound, and says when all together are thin', () => {
    expect(bandRates([record(3, 5, 1, 499), record(4, 5, 3, 5000)])).toMatchObject([
      { fromBand: 3, toBand: 4 },
    ]);
    expect(bandRates([record(3, 1, 1)])).toMatchObject([{ thin: true }]);
  });

  it('keeps states apart, adds records of one band up, leaves out bands without hours', () => {
    const rates = bandRates([
      record(4, 3, 1),
      record(4, 3, 2),
      record(9, 0, 0),
      { ...record(null, 50, 0.001), state: 'at-rest-afloat' },
    ]);
    expect(rates).toMatchObject([
      { state: 'sailing', fromBand: 4, toBand: 4, hours: 6, damagePerHour: 0.5 },
      { state: 'at-rest-afloat', fromBand: null, toBand: null, damagePerHour: 0.00002 },
    ]);
    expect(() => bandRates([record(4, 3, 1), record(null, 3, 1)])).toThrow(RangeError);
    expect(() => bandRates([record(4, -3, 1)])).toThrow(RangeError);
  });

  it('fits a power of the wind to three bands or more, and stops at the highest', () => {
    // Damage per hour 1e-6 * speed^5 exactly.
    const rows = [3, 4, 5, 6].map((band) => record(band, 10, 10 * 1e-6 * (4 * band) ** 5));
    const law = powerLawRate([...rows, record(8, 0.5, 99)]);
    expect(law?.beta).toBeCloseTo(5, 9);
    expect(law?.alpha).toBeCloseTo(Math.log(1e-6), 9);
    expect(law?.at(18)).toBeCloseTo(1e-6 * 18 ** 5, 9);
    expect(law?.at(24.1)).toBeNull();
    expect(powerLawRate(rows.slice(0, 2))).toBeNull();
  });
});

describe('unlogged hours', () => {
  const rates = bandRates([record(3, 10, 1), record(5, 10, 5)]);

  it('are charged once at the rate of their own state and wind', () => {
    const posting = postUnlogged(
      [
        { state: 'sailing', band: 3, hours: 4 },
        { state: 'sailing', band: 4, hours: 2 },
        { state: 'sailing', band: null, hours: 10 },
        { state: 'mast-out', band: null, hours: 4000 },
      ],
      rates,
    );
    // 4 * 0.1; 2 at the band above, 2 * 0.5; 10 at (1 + 5) / 20.
    expect(posting.posted.map(({ damage }) => damage)).toEqual([0.4, 1, 3, 0]);
    expect(posting.damage).toBeCloseTo(4.4, 12);
    expect(posting.notCovered).toEqual([]);
  });

  it('are listed, not extrapolated to, above the highest recorded wind or in a state never recorded', () => {
    const posting = postUnlogged(
      [
        { state: 'sailing', band: 6, hours: 3 },
        { state: 'at-rest-afloat', band: null, hours: 100 },
        { state: 'sailing', band: 5, hours: 0 },
      ],
      rates,
    );
    expect(posting.damage).toBe(0);
    expect(posting.posted).toEqual([]);
    expect(posting.notCovered.map(({ hours }) => hours)).toEqual([3, 100]);
    expect(posting.notCovered[0].words).toContain('highest recorded band is 5');
    expect(() => postUnlogged([{ state: 'sailing', band: 5, hours: -1 }], rates)).toThrow(RangeError);
  });

  it('know which groups answer for them', () => {
    const groups = [3, 4, 5, 6].map((band) => ({ state: 'sailing' as const, band }));
    const all = [
      ...groups,
      { state: 'sailing' as const, band: null },
      { state: 'motoring' as const, band: null },
    ];
    expect(answeringGroups(all, [5, 0, 5, 0, 0, 0])).toEqual([[0], [2], [2], [], [0, 2], []]);
  });

  it('before the first log are carried in, doubted by half, or not known', () => {
    expect(carriedIn(200, 0.001)).toMatchObject({ damage: 0.2, cov: 0.5 });
    expect(carriedIn(0, 0.001)).toMatchObject({ damage: 0, cov: 0 });
    expect(carriedIn(null, 0.001)).toBeNull();
    expect(carriedIn(200, null)).toBeNull();
    expect(() => carriedIn(-1, 1)).toThrow(RangeError);
  });
});

describe('an interval excluded by hand', () => {
  it('stands at the larger figure until a second person confirms', () => {
    expect(excludedInterval(0.4, 0.1, false)).toMatchObject({ damage: 0.4, basis: 'own-count' });
    expect(excludedInterval(0.1, 0.4, false)).toMatchObject({ damage: 0.4, basis: 'band-rate' });
    expect(excludedInterval(0.4, 0.1, true)).toMatchObject({ damage: 0.1, basis: 'band-rate' });
    expect(() => excludedInterval(-1, 0, true)).toThrow(RangeError);
  });
});

describe('planned use', () => {
  it('is the plan, else the last three seasons, else nothing', () => {
    const plan = [
      { month: 5, state: 'sailing' as const, hours: 100 },
      { month: 7, state: 'sailing' as const, hours: 200 },
      { month: 7, state: 'motoring' as const, hours: 20 },
    ];
    expect(plannedUse(plan, [])).toMatchObject({
      hoursPerYear: { sailing: 300, motoring: 20 },
      basis: 'plan',
    });
    expect(plannedUse(plan, [])?.sailingByMonth).toEqual([0, 0, 0, 0, 100, 0, 200, 0, 0, 0, 0, 0]);
    const seasons = [2021, 2022, 2023, 2024].map((season, i) => ({
      season,
      hours: { sailing: 100 * (i + 1) },
    }));
    expect(plannedUse(null, seasons)).toMatchObject({
      hoursPerYear: { sailing: 300 },
      basis: 'past-seasons',
    });
    expect(plannedUse([], [])).toBeNull();
    expect(() => plannedUse([{ month: 13, state: 'sailing', hours: 1 }], [])).toThrow(RangeError);
    expect(() => plannedUse(null, [{ season: 1, hours: { sailing: -1 } }])).toThrow(RangeError);
  });

  it('falls in its own months', () => {
    const summer = [0, 0, 0, 0, 10, 10, 10, 10, 0, 0, 0, 0];
    const profile = yearProfile('2026-01-01', summer);
    expect(profile.cumulative).toHaveLength(13);
    expect(useByShare(profile, 0.25)).toBe(0);
    expect(useByShare(profile, 0.5)).toBeCloseTo(0.5, 1);
    expect(useByShare(profile, 0.7)).toBe(1);
    // A year that begins in July has two of its four months at once, and two at its end.
    expect(useByShare(yearProfile('2026-07-01', summer), 2 / 12)).toBeCloseTo(0.5, 1);
    expect(useByShare(undefined, 0.3)).toBe(0.3);
    expect(() => yearProfile('2026-01-01', new Array<number>(12).fill(0))).toThrow(RangeError);
    expect(() => yearProfile('2026-01-01', [1])).toThrow(RangeError);
  });
});
