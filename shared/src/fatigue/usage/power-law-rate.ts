import { type BandRecord, isThin } from './band-rates.js';

/** Damage per hour as a power of the wind: exp(alpha) * speed^beta. */
export interface PowerLawRate {
  alpha: number;
  /** Usually between the slope of the curve and twice that: load grows with the square of the wind until sail is shortened. */
  beta: number;
  /** Highest wind it stands on; it says nothing beyond. */
  highestSpeed: number;
  /** Damage per hour at a wind speed; null above the highest recorded. */
  at: (speed: number) => number | null;
}

/**
 * Fits ln(damage per hour) = alpha + beta * ln(wind speed) by least squares, weighted by hours, to the bands with enough
 * record: another way than merging to answer for a thin band between others.
 *
 * @param records of one state, with wind
 * @returns null with fewer than three bands that have enough record and damage
 * Common practice; the form is an engineering estimate without a source.
 */
export function powerLawRate(records: readonly BandRecord[]): PowerLawRate | null {
  const points = records.flatMap(({ windSpeed, hours, cycles, damage }) =>
    windSpeed !== null && windSpeed > 0 && damage > 0 && !isThin({ hours, cycles })
      ? [{ x: Math.log(windSpeed), y: Math.log(damage / hours), weight: hours, windSpeed }]
      : [],
  );
  if (points.length < 3) return null;
  const weights = points.reduce((sum, { weight }) => sum + weight, 0);
  const meanX = points.reduce((sum, { x, weight }) => sum + weight * x, 0) / weights;
  const meanY = points.reduce((sum, { y, weight }) => sum + weight * y, 0) / weights;
  const spread = points.reduce((sum, { x, weight }) => sum + weight * (x - meanX) ** 2, 0);
  if (spread === 0) return null;
  const beta = points.reduce((sum, { x, y, weight }) => sum + weight * (x - meanX) * (y - meanY), 0) / spread;
  const alpha = meanY - beta * meanX;
  const highestSpeed = Math.max(...points.map(({ windSpeed }) => windSpeed));
  return {
    alpha,
    beta,
    highestSpeed,
    at: (speed) => (speed > highestSpeed ? null : speed <= 0 ? 0 : Math.exp(alpha + beta * Math.log(speed))),
  };
}
