import { insertTurningPoint } from '../rainflow/insert-turning-point.js';
import { emptySpectrum, type LoadSpectrum } from '../rainflow/load-spectrum.js';
import { mergeAll } from '../rainflow/merge-spectra.js';
import { inTimeOrder, type LogOfAccount } from './log-of-account.js';

/**
 * The load spectrum of everything a part carried as far as it was logged: its logs in time order behind the turning
 * point at zero load a part begins with. Its damage is the total of `accountOf`, to rounding.
 *
 * @param logs all logs posted to the part, in any order; at least one
 * @throws RangeError without a log
 */
export function wholeHistory(logs: readonly LogOfAccount[]): LoadSpectrum {
  return mergeAll([slackPart(logs), ...inTimeOrder(logs).map(({ spectrum }) => spectrum)]);
}

/**
 * The spectrum of a part before its first log: one turning point at zero load, on the day the first log begins.
 *
 * @throws RangeError without a log
 */
export function slackPart(logs: readonly LogOfAccount[]): LoadSpectrum {
  const [first] = inTimeOrder(logs);
  if (first === undefined) throw new RangeError('a history needs at least one log');
  const { step, residueDay } = first.spectrum;
  const day = residueDay.length > 0 ? residueDay[0] : 0;
  return insertTurningPoint(emptySpectrum(step), { load: 0, day });
}
