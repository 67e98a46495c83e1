import { dayNumber } from '../life/days.js';
import { addMonths } from '../life/days.js';

/** Months for which a calibration stands for a load cell. */
export const CALIBRATION_MONTHS = 24;
/** Doubt about the gain of a load cell nobody has calibrated lately. Engineering estimate. */
export const UNCALIBRATED_GAIN_COV = 0.1;
/** Doubt right after a calibration whose own error was not stated. Engineering estimate. */
export const CALIBRATED_GAIN_COV = 0.03;

/** Doubt about a load cell's gain, with the sentence for the report. */
export interface GainDoubt {
  /** Coefficient of variation of true over recorded load. */
  cov: number;
  words: string;
}

/**
 * Doubt about the gain of a load cell over one calibration period.
 *
 * @param calibration the last one before or during the period, with its stated error where there is one; null: none
 * @param usedUntilOn last day of the period, 'YYYY-MM-DD'
 * @throws RangeError for days that are not calendar days, or a negative error
 * The figures are engineering estimates without a source; the errors of cells in fatigue handbooks run from 0.25 % of
 * full scale to 3 % (common practice).
 */
export function gainDoubt(
  calibration: { calibratedOn: string; cov: number | null } | null,
  usedUntilOn: string,
): GainDoubt {
  dayNumber(usedUntilOn);
  if (calibration === null) {
    return {
      cov: UNCALIBRATED_GAIN_COV,
      words: 'The load cell has no calibration: its loads may be off by 10 %.',
    };
  }
  const { calibratedOn, cov } = calibration;
  if (cov !== null && !(cov >= 0))
    throw new RangeError(`A calibration error must be zero or more, not ${cov}.`);
  if (usedUntilOn > addMonths(calibratedOn, CALIBRATION_MONTHS)) {
    return {
      cov: Math.max(UNCALIBRATED_GAIN_COV, cov ?? 0),
      words: `The load cell was last calibrated on ${calibratedOn}, more than ${CALIBRATION_MONTHS} months before: its loads may be off by 10 %.`,
    };
  }
  const used = cov ?? CALIBRATED_GAIN_COV;
  return { cov: used, words: `Calibrated on ${calibratedOn}, to ${Number((used * 100).toPrecision(2))} %.` };
}
