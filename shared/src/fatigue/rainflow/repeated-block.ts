import { astmCounts } from './astm-counts.js';
import type { CycleCount } from './cycle-count.js';
import { fourPoint } from './four-point.js';
import type { LoadSpectrum } from './load-spectrum.js';
import { turningPoints } from './turning-points.js';

/**
 * A spectrum counted as a block that repeats for ever: whole cycles only, the residue closed by itself.
 *
 * The residue is followed by itself and the cycles found on the way through the second copy are kept; the
 * largest of them spans the whole range of loads.
 *
 * Source: ASTM E1049-85 (2017), 5.4.5 (repeating history).
 *
 * @returns range and mean in load units, sorted by range and then mean
 */
export function repeatedBlock(spectrum: LoadSpectrum): CycleCount[] {
  const { residue } = spectrum;
  // One copy leaves the residue as it is, up to ties; what the second copy adds is one period's worth.
  const first = fourPoint(residue);
  const twice = fourPoint(turningPoints([...first.residue, ...first.residue]));
  const pairs = [...first.closed, ...twice.closed];
  const closing: LoadSpectrum = {
    ...spectrum,
    days: [...spectrum.days],
    residue: new Float64Array(0),
    residueDay: new Int32Array(0),
  };
  for (const [from, to] of pairs) {
    const cycles = {
      low: Float64Array.of(Math.min(from, to)),
      high: Float64Array.of(Math.max(from, to)),
      count: Float64Array.of(1),
    };
    closing.days.push({ day: 0, cycles });
  }
  return astmCounts(closing);
}
