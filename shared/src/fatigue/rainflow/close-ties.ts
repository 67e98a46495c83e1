import { fourPoint } from './four-point.js';
import type { LoadSpectrum } from './load-spectrum.js';

/** A spectrum's count with ties closed, as the four-point method is usually written. */
export interface TiesClosed {
  /** Whole cycles, those of the spectrum and those that close by a tie in its residue. */
  closedCycles: number;
  /** The remaining residue in load units. */
  residue: number[];
}

/**
 * The usual view of a spectrum: pairs of the residue that lie exactly on the span of their neighbours are
 * closed cycles too. The sum of whole and half cycles per range and mean is the same in both views.
 *
 * @param spectrum the spectrum
 */
export function closeTies(spectrum: LoadSpectrum): TiesClosed {
  const { closed, residue } = fourPoint(spectrum.residue);
  let closedCycles = closed.length;
  for (const { cycles } of spectrum.days) for (const count of cycles.count) closedCycles += count;
  const scale = spectrum.step > 0 ? spectrum.step : 1;
  return { closedCycles, residue: residue.map((level) => level * scale) };
}
