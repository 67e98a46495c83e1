import { describe, expect, it } from 'vitest';
import { loadAgainstWind, workingLoadCrossing } from './load-against-wind.js';

const at = (windKn: number, angleDeg: number, loadKn: number, hours: number) => ({
  windKn,
  angleDeg,
  loadKn,
  hours,
});

describe('loads against wind', () => {
  it('weighs each load by its time (hand: 4 h of 10, 5 h of 12, 1 h of 30)', () => {
    const [bin, ...rest] = loadAgainstWind([at(22, 40, 30, 1), at(21, -45, 10, 4), at(24.9, 320, 12, 5)]);
    expect(rest).toEqual([]);
    expect(bin).toMatchObject({ fromKn: 20, toKn: 25, fromDeg: 30, toDeg: 60, hours: 10 });
    // Half of 10 h lies at 12, 9.5 h at 30.
    expect(bin.loads).toEqual({ medianKn: 12, p95Kn: 30, maxKn: 30 });
    expect(bin.words).toBe('In 10 h at 20 to 25 kn, 95 % of loads were below 30 kN.');
  });

  it('withholds loads under two hours and keeps the hours', () => {
    const [bin] = loadAgainstWind([at(36, 90, 50, 1.99)]);
    expect(bin).toMatchObject({ fromKn: 35, toKn: null, hours: 1.99, loads: null });
    expect(bin.words).not.toContain('50');
    expect(loadAgainstWind([at(36, 90, 50, 2)])[0].loads?.maxKn).toBe(50);
  });

  it('cuts bins closed below, angles from the bow on either side', () => {
    const bins = loadAgainstWind([
      at(9.99, 0, 1, 3),
      at(10, 0, 1, 3),
      at(10, 180, 1, 3),
      at(10, 181, 1, 3),
      at(10, 0, 9, 0),
    ]);
    expect(bins.map(({ fromKn, fromDeg, hours }) => [fromKn, fromDeg, hours])).toEqual([
      [5, 0, 3],
      [10, 0, 3],
      [10, 150, 6],
    ]);
  });

  it('finds the wind at which loads pass a working load, as far as it was recorded', () => {
    const rows = [at(12, 30, 10, 20), at(17, 90, 18, 20), at(22, 60, 26, 20), at(27, 60, 40, 1)];
    expect(workingLoadCrossing(rows, 20)).toEqual({ fromKn: 20, recordedToKn: 25 });
    expect(workingLoadCrossing(rows, 30)).toEqual({ fromKn: null, recordedToKn: 25 });
    expect(workingLoadCrossing([at(12, 30, 10, 1)], 30)).toBeNull();
    expect(() => workingLoadCrossing(rows, 0)).toThrow(RangeError);
  });

  it('refuses what cannot be', () => {
    expect(() => loadAgainstWind([at(-1, 0, 1, 1)])).toThrow(RangeError);
    expect(() => loadAgainstWind([], { speedsKn: [0, 10, 10], anglesDeg: [0] })).toThrow(RangeError);
    expect(() => loadAgainstWind([], { speedsKn: [5, 10], anglesDeg: [0] })).toThrow(RangeError);
  });
});
