import type { LoadSpectrum } from '../rainflow/load-spectrum.js';

/**
 * The cycles a log closed by itself: its spectrum without the residue. What they do to a detail is the log's
 * *recorded* amount, which no other log can change.
 *
 * @param spectrum spectrum of one log
 */
export function closedCycles(spectrum: LoadSpectrum): LoadSpectrum {
  return { ...spectrum, residue: new Float64Array(0), residueDay: new Int32Array(0) };
}
