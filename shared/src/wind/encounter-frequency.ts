const GRAVITY_MPS2 = 9.80665;

/**
 * Frequency at which a vessel meets waves: f * (1 - 2 pi f * speed / g * cos(angle)).
 *
 * @param waveFrequencyHz in deep water, Hz
 * @param speedMps of the vessel, m/s
 * @param angleRad between her course and the way the waves run: pi is a head sea, 0 a following sea
 * @returns Hz; its sign shows who overtakes whom in a following sea
 */
export function encounterFrequencyHz(waveFrequencyHz: number, speedMps: number, angleRad: number): number {
  return (
    waveFrequencyHz * (1 - ((2 * Math.PI * waveFrequencyHz * speedMps) / GRAVITY_MPS2) * Math.cos(angleRad))
  );
}
