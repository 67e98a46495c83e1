const INTERVALS = 64;

/** What instantaneous samples of a sine see of it. */
export interface SamplingLoss {
  /** Mean recorded peak over the true one. */
  meanPeak: number;
  /** Lowest peak that can be recorded, over the true one. */
  worstPeak: number;
  /** Recorded damage over the true one. */
  damageRatio: number;
}

/**
 * Share of a sine's peak and damage that sampling catches. The sample nearest to a crest is off by a phase that is
 * uniform within plus and minus pi * ratio; crest and trough miss independently, so the damage ratio is the mean of
 * ((cos of one + cos of the other) / 2)^m.
 *
 * @param frequencyOverRate frequency of the load over the sampling rate, 0 to 0.5
 * @param m slope of the curve
 * @throws RangeError outside 0 to 0.5
 * Source: derived from the geometry of a sampled sine.
 */
export function samplingLoss(frequencyOverRate: number, m: number): SamplingLoss {
  if (!(frequencyOverRate >= 0 && frequencyOverRate <= 0.5)) {
    throw new RangeError(
      `Frequency over sampling rate must lie between 0 and 0.5, not ${frequencyOverRate}.`,
    );
  }
  const phase = Math.PI * frequencyOverRate;
  if (phase === 0) return { meanPeak: 1, worstPeak: 1, damageRatio: 1 };
  // By symmetry the mean over plus and minus the phase is the mean over the positive half; Simpson's rule twice.
  const cosines = Array.from({ length: INTERVALS + 1 }, (_, i) => Math.cos((phase * i) / INTERVALS));
  const weights = cosines.map(
    (_, i) => (i === 0 || i === INTERVALS ? 1 : i % 2 === 1 ? 4 : 2) / (3 * INTERVALS),
  );
  let damageRatio = 0;
  for (let i = 0; i <= INTERVALS; i++) {
    for (let j = 0; j <= INTERVALS; j++) {
      damageRatio += weights[i] * weights[j] * (Math.max(cosines[i] + cosines[j], 0) / 2) ** m;
    }
  }
  return { meanPeak: Math.sin(phase) / phase, worstPeak: Math.cos(phase), damageRatio };
}
