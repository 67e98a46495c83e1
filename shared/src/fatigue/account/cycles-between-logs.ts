import type { LoadSpectrum } from '../rainflow/load-spectrum.js';
import { mergeAll } from '../rainflow/merge-spectra.js';
import { inTimeOrder, type LogOfAccount } from './log-of-account.js';
import { slackPart } from './whole-history.js';

/**
 * What no single log could close: the residues of all logs of a part, folded in time order behind a turning point
 * at zero load, since a part was slack when it was fitted. The cycles that close here and the half cycles of the
 * final open residue make the *between logs* amount.
 *
 * @param logs all logs posted to the part, in any order; at least one
 * @throws RangeError without a log
 */
export function cyclesBetweenLogs(logs: readonly LogOfAccount[]): LoadSpectrum {
  return mergeAll([slackPart(logs), ...inTimeOrder(logs).map(({ spectrum }) => residueAlone(spectrum))]);
}

function residueAlone(spectrum: LoadSpectrum): LoadSpectrum {
  return { ...spectrum, days: [], turningPoints: spectrum.residue.length };
}
