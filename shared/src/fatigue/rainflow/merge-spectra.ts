import { commonStep } from './common-step.js';
import { emptySpectrum, type CycleTable, type LoadSpectrum } from './load-spectrum.js';
import { mergeCycleTables } from './merge-cycle-tables.js';
import { onGrid } from './on-grid.js';
import { reduceResidue } from './reduce-residue.js';
import { tablesByDay } from './tables-by-day.js';

/**
 * The spectrum of one stretch of history followed by another: closed cycles are added, and the four-point rule
 * runs over the earlier residue followed by the later one. Exactly the spectrum of one pass over both, wherever
 * the cut; associative; a spectrum without samples and without residue is the identity.
 * Spectra on different grids merge on the coarsest grid that holds both (`commonStep`).
 *
 * Source: Marsh et al., Int. J. Fatigue 82 (2016) 757-765, on joining residues; checked against one pass at
 * every cut in the tests.
 *
 * @param earlier spectrum of the earlier stretch
 * @param later spectrum of the later stretch
 */
export function mergeSpectra(earlier: LoadSpectrum, later: LoadSpectrum): LoadSpectrum {
  return mergeAll([earlier, later]);
}

/**
 * The spectrum of many stretches of history in a row; the same as merging them one after the other.
 *
 * @param spectra spectra in time order
 */
export function mergeAll(spectra: readonly LoadSpectrum[]): LoadSpectrum {
  const parts = spectra.filter((part) => part.residue.length > 0 || part.samples > 0 || part.days.length > 0);
  if (parts.length === 0) return emptySpectrum(spectra.length > 0 ? spectra[0].step : 0);
  if (parts.length === 1) return parts[0];
  let step = parts[0].step;
  for (const part of parts) step = commonStep(step, part.step);
  step = safeStep(parts, step);
  const aligned = parts.map((part) => onGrid(part, step));

  let points = 0;
  for (const part of aligned) points += part.residue.length;
  const loads = new Float64Array(points);
  const days = new Int32Array(points);
  let at = 0;
  let samples = 0;
  let turningPoints = 0;
  const tables = new Map<number, CycleTable[]>();
  for (const part of aligned) {
    loads.set(part.residue, at);
    days.set(part.residueDay, at);
    at += part.residue.length;
    samples += part.samples;
    turningPoints += part.turningPoints;
    for (const { day, cycles } of part.days) addTable(tables, day, cycles);
  }

  const joined = reduceResidue(loads, days);
  for (const [day, cycles] of tablesByDay(joined)) addTable(tables, day, cycles);
  return {
    step,
    days: [...tables.keys()]
      .sort((a, b) => a - b)
      .map((day) => ({ day, cycles: mergeCycleTables(tables.get(day) ?? []) })),
    residue: joined.residue,
    residueDay: joined.residueDay,
    samples,
    // Points that stop being extremes where two stretches meet are no turning points of the whole.
    turningPoints: turningPoints - (points - joined.turningPoints),
  };
}

function addTable(tables: Map<number, CycleTable[]>, day: number, cycles: CycleTable): void {
  const known = tables.get(day);
  if (known === undefined) tables.set(day, [cycles]);
  else known.push(cycles);
}

/** No grid at all rather than one so fine that its levels are no longer exact whole numbers. */
function safeStep(parts: readonly LoadSpectrum[], step: number): number {
  if (step === 0) return 0;
  for (const part of parts) {
    if (part.step === step) continue;
    // The extremes of a history never pair, so the residue holds its largest and smallest load.
    for (const level of part.residue) {
      if (Math.abs(level) * (part.step / step) > Number.MAX_SAFE_INTEGER) return 0;
    }
  }
  return step;
}
