import type { LoadSpectrum } from './load-spectrum.js';
import { levelOf } from './level-of.js';
import { mergeSpectra } from './merge-spectra.js';

/**
 * A spectrum followed by one more load that was not recorded but is known to have happened: zero when a mast is
 * stepped, unstepped or slackened, and at the start of a new part, so that setting up counts as a range.
 *
 * @param spectrum the spectrum so far; `emptySpectrum(step)` for a new part
 * @param point.load the load, rounded to the spectrum's grid
 * @param point.day the day it happened
 */
export function insertTurningPoint(
  spectrum: LoadSpectrum,
  point: { load: number; day: number },
): LoadSpectrum {
  const { step } = spectrum;
  const level = levelOf(point.load, step) + 0;
  return mergeSpectra(spectrum, {
    step,
    days: [],
    residue: Float64Array.of(level),
    residueDay: Int32Array.of(point.day),
    samples: 0,
    turningPoints: 1,
  });
}
