import { describe, expect, it } from 'vitest';
import { calibrate } from './calibrate.js';
import { type Stratum, syntheticVessel } from './synthetic-vessel.js';

/** The 99.9 % point of chi-square with 19 degrees of freedom (table). */
const CHI_SQUARE_19 = 43.82;

function chiSquare(counts: readonly number[]): number {
  const expected = counts.reduce((sum, count) => sum + count, 0) / counts.length;
  return counts.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
}

describe('dates of simulated vessels whose truth is known', () => {
  it(
    'holds nine truths in ten between the 5th and 95th percentile, without bias, evenly',
    { timeout: 180_000 },
    () => {
      const { life, fan } = calibrate({ vessels: 2000, firstSeed: 1, stratum: 'mixed' });
      expect(life.vessels).toBe(2000);
      expect(Math.abs(life.between5And95 - 0.9)).toBeLessThan(3 * Math.sqrt(0.09 / 2000));
      expect(Math.abs(life.bias)).toBeLessThan(3 * life.biasError);
      expect(chiSquare(life.transform)).toBeLessThan(CHI_SQUARE_19);
      expect(Math.abs(fan.between5And95 - 0.9)).toBeLessThan(0.03);
    },
  );

  it.each<Stratum>(['one-season', 'under-10-days', 'half-unlogged', 'no-wind'])(
    'stays within three points with %s',
    { timeout: 120_000 },
    (stratum) => {
      const { life } = calibrate({ vessels: 1000, firstSeed: 1, stratum, draws: 150, withFan: false });
      expect(Math.abs(life.between5And95 - 0.9)).toBeLessThanOrEqual(0.03);
    },
  );

  it(
    'notices a method that is wrong: loads read 15 % low and the curve two deviations too long',
    { timeout: 60_000 },
    () => {
      const { life } = calibrate({
        vessels: 300,
        firstSeed: 1,
        stratum: 'mixed',
        draws: 150,
        withFan: false,
        misfit: { loggerOffAboveKn: 22, gainBias: -0.15, seasonCov: 0.5, curveOffBySd: 2 },
      });
      expect(life.bias).toBeLessThan(-10 * life.biasError);
      expect(life.between5And95).toBeLessThan(0.85);
    },
  );

  it('makes the same vessel of the same seed', () => {
    expect(syntheticVessel(7, 'mixed')).toEqual(syntheticVessel(7, 'mixed'));
    expect(syntheticVessel(7, 'mixed').truth).not.toEqual(syntheticVessel(8, 'mixed').truth);
    const short = syntheticVessel(7, 'under-10-days').use.days.filter(({ loggedHours }) =>
      loggedHours.some((hours) => hours > 0),
    );
    expect(short.length).toBeLessThan(10);
  });
});
