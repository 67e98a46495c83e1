import { samplingLoss } from '../damage/sampling-loss.js';

/** No correction is larger. Engineering choice. */
export const MOST_CORRECTION = 2;
/** Frequency over rate above which a log is only a lower bound. Engineering choice. */
export const MOST_FREQUENCY_OVER_RATE = 0.3;
/** The doubt about a correction, as share of its logarithm. Engineering estimate. */
const DOUBT_SHARE = 0.5;

/** What a recording rate missed, as an entry of its own. */
export interface SamplingCorrection {
  /** Dominant frequency over sampling rate. */
  frequencyOverRate: number;
  /** Recorded damage over true damage. */
  damageRatio: number;
  /** Multiplies the recorded damage; 1 to 2. What it adds is posted by itself. */
  factor: number;
  /** True where the cap cut it. */
  capped: boolean;
  /** True where the recorded damage is a lower bound and no date follows from this log. */
  lowerBoundOnly: boolean;
  /** Doubt about the factor, standard deviation of its logarithm. */
  lnSd: number;
  words: string;
}

/**
 * Correction for what the sampling rate missed of the peaks: one over the share of the damage that samples of a sine
 * catch, at most 2. It is on unless a person switches it off with a reason.
 *
 * @param frequencyHz dominant frequency of the load
 * @param rateHz samples per second, above zero
 * @param m slope of the damage, see damageSlope
 * @param averaged true where the logger stores means over its interval: they lose sin(x)/x more of each peak
 * @throws RangeError for a negative frequency or a rate that is not above zero
 * Source: geometry of a sampled sine (derived); cap and bound are engineering choices.
 */
export function samplingCorrection(
  frequencyHz: number,
  rateHz: number,
  m: number,
  averaged = false,
): SamplingCorrection {
  if (!(frequencyHz >= 0) || !(rateHz > 0)) {
    throw new RangeError(
      `A frequency of zero or more and a rate above zero are needed, not ${frequencyHz} and ${rateHz}.`,
    );
  }
  const frequencyOverRate = frequencyHz / rateHz;
  // Beyond half the rate a sine shows up as a slower one: nothing can be told, and the bound is passed anyway.
  const { damageRatio: sampled, meanPeak } = samplingLoss(Math.min(frequencyOverRate, 0.5), m);
  const damageRatio = averaged ? sampled * meanPeak ** m : sampled;
  const wanted = 1 / damageRatio;
  const factor = Math.min(wanted, MOST_CORRECTION);
  const lowerBoundOnly = frequencyOverRate > MOST_FREQUENCY_OVER_RATE;
  return {
    frequencyOverRate,
    damageRatio,
    factor,
    capped: wanted > MOST_CORRECTION,
    lowerBoundOnly,
    lnSd: DOUBT_SHARE * Math.log(factor),
    words: wordsFor(frequencyHz, rateHz, factor, lowerBoundOnly),
  };
}

function wordsFor(frequencyHz: number, rateHz: number, factor: number, lowerBoundOnly: boolean): string {
  const rates = `The load cycles at about ${short(frequencyHz)} Hz and was recorded at ${short(rateHz)} Hz`;
  if (lowerBoundOnly) return `${rates}: too slow. The recorded damage is a lower bound, and gives no date.`;
  return `${rates}: ${short((factor - 1) * 100)} % is added for the peaks between samples.`;
}

function short(value: number): string {
  return String(Number(value.toPrecision(2)));
}
