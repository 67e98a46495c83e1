import { insertTurningPoint } from '../rainflow/insert-turning-point.js';
import { emptySpectrum, type LoadSpectrum } from '../rainflow/load-spectrum.js';
import { mergeAll } from '../rainflow/merge-spectra.js';
import { inTimeOrder, type LogOfAccount } from './log-of-account.js';

/**
 * What no single log could close: the residues of all logs of a part, folded in time order behind a turning point
 * at zero load, since a part was slack when it was fitted. The cycles that close here and the half cycles of the
 * final open residue make the *between logs* amount.
 *
 * @param logs all logs posted to the part, in any order; at least one
 * @throws RangeError without a log
 */
export function cyclesBetweenLogs(logs: readonly LogOfAccount[]): LoadSpectrum {
  if (logs.length === 0) throw new RangeError('cycles between logs need at least one log');
  const ordered = inTimeOrder(logs);
  const first = ordered[0].spectrum;
  const firstDay = first.residueDay.length > 0 ? first.residueDay[0] : 0;
  const slack = insertTurningPoint(emptySpectrum(first.step), { load: 0, day: firstDay });
  return mergeAll([slack, ...ordered.map(({ spectrum }) => residueAlone(spectrum))]);
}

function residueAlone(spectrum: LoadSpectrum): LoadSpectrum {
  return { ...spectrum, days: [], turningPoints: spectrum.residue.length };
}
