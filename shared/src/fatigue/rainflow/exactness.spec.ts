import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { astmCounts } from './astm-counts.js';
import { closeTies } from './close-ties.js';
import type { CycleCount } from './cycle-count.js';
import { dropSmallRanges } from './drop-small-ranges.js';
import { fourPoint } from './four-point.js';
import { emptySpectrum, type LoadSpectrum } from './load-spectrum.js';
import { mergeAll, mergeSpectra } from './merge-spectra.js';
import { racetrack } from './racetrack.js';
import { RainflowCounter } from './rainflow-counter.js';
import { decodeSpectrum, encodeSpectrum } from './spectrum-codec.js';
import { spectrumOf } from './spectrum-of.js';
import { turningPoints } from './turning-points.js';

/** Few levels make many ties, many levels make few; both kinds of history have to come out right. */
const history = fc.oneof(
  fc.array(fc.integer({ min: 0, max: 3 }), { maxLength: 40 }),
  fc.array(fc.integer({ min: -20, max: 20 }), { maxLength: 60 }),
  fc.array(fc.double({ min: -1e3, max: 1e3, noNaN: true }), { maxLength: 40 }),
);
const cuts = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 6 });

function pieces<T>(items: T[], at: number[]): T[][] {
  const ends = [...at.map((share) => Math.floor(share * (items.length + 1))), items.length].sort(
    (a, b) => a - b,
  );
  return ends.map((end, i) => items.slice(i === 0 ? 0 : ends[i - 1], end));
}

/** Each sample on a day of its own: days then betray any difference in how ties were paired. */
function dated(loads: number[], from = 0): LoadSpectrum {
  return spectrumOf(loads, { day: loads.map((_, i) => from + i) });
}

function datedPieces(loads: number[], at: number[]): LoadSpectrum[] {
  let from = 0;
  return pieces(loads, at).map((piece) => {
    const spectrum = dated(piece, from);
    from += piece.length;
    return spectrum;
  });
}

/**
 * The three-point algorithm of ASTM E1049-85 5.4.4, written from the text of the standard and independently of the
 * engine: range by range with a start point S, whole cycles taken out, halves at the start.
 */
function threePoint(samples: number[]): Map<string, number> {
  const counts = new Map<string, number>();
  const add = (a: number, b: number, count: number) => {
    const key = `${Math.min(a, b)} ${Math.max(a, b)}`;
    counts.set(key, (counts.get(key) ?? 0) + count);
  };
  const extremes = samples.filter((v, i) => i === 0 || v !== samples[i - 1]);
  const reversals = extremes.filter(
    (v, i) => i === 0 || i === extremes.length - 1 || extremes[i - 1] < v !== v < extremes[i + 1],
  );
  let open: number[] = [];
  for (const next of reversals) {
    open.push(next);
    while (open.length >= 3) {
      const [p, q, r] = open.slice(-3);
      if (Math.max(q, r) < Math.max(p, q) || Math.min(q, r) > Math.min(p, q)) break;
      if (open.length === 3) {
        add(p, q, 0.5);
        open = open.slice(1);
      } else {
        add(p, q, 1);
        open.splice(-3, 2);
      }
    }
  }
  for (let i = 1; i < open.length; i++) add(open[i - 1], open[i], 0.5);
  return counts;
}

function byExtremes({ days, residue }: LoadSpectrum): Map<string, number> {
  const counts = new Map<string, number>();
  const add = (low: number, high: number, count: number) =>
    counts.set(`${low} ${high}`, (counts.get(`${low} ${high}`) ?? 0) + count);
  for (const { cycles } of days)
    cycles.count.forEach((count, i) => add(cycles.low[i], cycles.high[i], count));
  for (let i = 1; i < residue.length; i++) {
    add(Math.min(residue[i - 1], residue[i]), Math.max(residue[i - 1], residue[i]), 0.5);
  }
  return counts;
}

describe('a load spectrum', () => {
  // RF-17, after McInnes and Meehan, Int. J. Fatigue 30 (2008) 547-559.
  it('equals the three-point count of ASTM E1049-85 on any history', () => {
    fc.assert(
      fc.property(history, (loads) => {
        expect(byExtremes(spectrumOf(loads))).toEqual(threePoint(loads.map((load) => load + 0)));
      }),
      { numRuns: 1500 },
    );
  });

  it('has the residue and the closed cycles of the four-point method once ties are closed', () => {
    fc.assert(
      fc.property(history, (loads) => {
        const { closed, residue } = fourPoint(turningPoints(loads));
        const view = closeTies(spectrumOf(loads));
        expect(view.closedCycles).toBe(closed.length);
        expect(view.residue.map((load) => load + 0)).toEqual(residue.map((load) => load + 0));
      }),
      { numRuns: 1000 },
    );
  });

  it('counts its turning points', () => {
    fc.assert(
      fc.property(history, (loads) => {
        expect(spectrumOf(loads).turningPoints).toBe(turningPoints(loads).length);
      }),
    );
  });

  it('is the same from one pass and from pieces, at every cut, to the day and the byte', () => {
    fc.assert(
      fc.property(history, cuts, (loads, at) => {
        expect(encodeSpectrum(mergeAll(datedPieces(loads, at)))).toEqual(encodeSpectrum(dated(loads)));
      }),
      { numRuns: 2000 },
    );
  });

  it('merges in any grouping', () => {
    fc.assert(
      fc.property(history, cuts, fc.infiniteStream(fc.nat()), (loads, at, choices) => {
        const spectra = datedPieces(loads, at);
        const choice = choices[Symbol.iterator]();
        while (spectra.length > 1) {
          const i = (choice.next().value ?? 0) % (spectra.length - 1);
          spectra.splice(i, 2, mergeSpectra(spectra[i], spectra[i + 1]));
        }
        expect(encodeSpectrum(spectra[0])).toEqual(encodeSpectrum(dated(loads)));
      }),
      { numRuns: 1000 },
    );
  });

  it('does not change by merging with nothing', () => {
    fc.assert(
      fc.property(history, (loads) => {
        const spectrum = dated(loads);
        expect(mergeSpectra(emptySpectrum(0), spectrum)).toEqual(spectrum);
        expect(mergeSpectra(spectrum, emptySpectrum(0))).toEqual(spectrum);
        expect(mergeSpectra(spectrum, emptySpectrum(0.5))).toEqual(spectrum);
      }),
    );
  });

  it('can be stored and carried on at any point', () => {
    fc.assert(
      fc.property(history, cuts, (loads, at) => {
        let counter = new RainflowCounter({ step: 0 });
        let day = 0;
        for (const piece of pieces(loads, at)) {
          for (const load of piece) counter.push(Float64Array.of(load), 1, day++);
          counter = RainflowCounter.fromState(counter.state());
        }
        expect(encodeSpectrum(counter.spectrum())).toEqual(encodeSpectrum(dated(loads)));
      }),
      { numRuns: 500 },
    );
  });

  it('is stored the same straight from the counter', () => {
    fc.assert(
      fc.property(history, fc.constantFrom(0, 0.5), fc.integer({ min: 1, max: 9 }), (loads, step, perDay) => {
        const counter = new RainflowCounter({ step });
        loads.forEach((load, i) => counter.push(Float64Array.of(load), 1, Math.floor(i / perDay)));
        expect(counter.encoded()).toEqual(encodeSpectrum(counter.spectrum()));
        const days = loads.map((_, i) => Math.floor(i / perDay));
        expect(counter.encoded()).toEqual(encodeSpectrum(spectrumOf(loads, { step, day: days })));
      }),
      { numRuns: 500 },
    );
  });

  it('keeps the same ranges when the history is read backwards', () => {
    fc.assert(
      fc.property(history, (loads) => {
        const ranges = (counts: CycleCount[]) => counts.filter(({ count }) => count > 0);
        expect(ranges(astmCounts(spectrumOf([...loads].reverse())))).toEqual(
          ranges(astmCounts(spectrumOf(loads))),
        );
      }),
    );
  });

  it('mirrors when the history is mirrored', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -9, max: 9 }), { maxLength: 50 }), (loads) => {
        const mirrored = astmCounts(spectrumOf(loads.map((load) => -load)));
        const expected = astmCounts(spectrumOf(loads))
          .map(({ range, mean, count }) => ({ range, mean: 0 - mean, count }))
          .sort((a, b) => a.range - b.range || a.mean - b.mean);
        expect(mirrored).toEqual(expected);
      }),
    );
  });

  it('passes over missing samples as if they were not there', () => {
    fc.assert(
      fc.property(history, cuts, (loads, at) => {
        const withGaps = pieces(loads, at).flatMap((piece) => [NaN, ...piece, NaN, NaN]);
        expect(spectrumOf(withGaps)).toEqual(spectrumOf(loads));
      }),
    );
  });

  it('on a grid is the spectrum of the rounded history', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: -50, max: 50, noNaN: true }), { maxLength: 80 }), (loads) => {
        const levels = loads.map((load) => Math.round(load / 0.5));
        const onGrid = spectrumOf(loads, { step: 0.5 });
        expect({ ...onGrid, step: 1 }).toEqual(spectrumOf(levels, { step: 1 }));
      }),
    );
  });

  it('knows each closed cycle as that of the day of its higher extreme', () => {
    // 0 on day 10, 8 on day 11, 3 on day 12, 9 on day 13: the cycle 8 to 3 closes on day 13 and peaked on day 11.
    const { days } = spectrumOf([0, 8, 3, 9], { day: [10, 11, 12, 13] });
    expect(days.map(({ day }) => day)).toEqual([11]);
    // Upside down the higher extreme of the cycle -8 to -3 is the later one.
    const down = spectrumOf([0, -8, -3, -9], { day: [10, 11, 12, 13] });
    expect(down.days.map(({ day }) => day)).toEqual([12]);
  });

  it('gives a peak that lasts over midnight to the day it began', () => {
    const { days } = spectrumOf([0, 8, 8, 3, 9], { day: [10, 10, 11, 11, 11] });
    expect(days.map(({ day }) => day)).toEqual([10]);
    // Rising within one level of the grid is no new extreme either.
    const onGrid = spectrumOf([0, 8, 8.1, 3, 9], { step: 1, day: [10, 10, 11, 11, 11] });
    expect(onGrid.days.map(({ day }) => day)).toEqual([10]);
  });
});

describe('hysteresis', () => {
  it('applied after counting keeps exactly the closed cycles the racetrack filter keeps', () => {
    fc.assert(
      fc.property(history, fc.integer({ min: 1, max: 8 }), (loads, threshold) => {
        const dropped = closedOf(dropSmallRanges(spectrumOf(loads), threshold));
        const filtered = closedOf(spectrumOf(racetrack(loads, threshold)));
        // The filter pairs ties at its ends differently; whole cycles of both views agree once ties are closed.
        expect(dropped).toEqual(filtered);
      }),
      { numRuns: 500 },
    );
  });

  function closedOf(spectrum: LoadSpectrum): [number, number, number][] {
    const closed = new Map<string, number>();
    for (const { cycles } of spectrum.days) {
      cycles.count.forEach((count, i) => {
        const key = `${cycles.low[i]} ${cycles.high[i]}`;
        closed.set(key, (closed.get(key) ?? 0) + count);
      });
    }
    for (const [from, to] of fourPoint(spectrum.residue).closed) {
      const key = `${Math.min(from, to)} ${Math.max(from, to)}`;
      closed.set(key, (closed.get(key) ?? 0) + 1);
    }
    return [...closed]
      .map(([key, count]): [number, number, number] => {
        const [low, high] = key.split(' ').map(Number);
        return [low, high, count];
      })
      .sort((a, b) => a[0] - b[0] || a[1] - b[1]);
  }
});

describe('the stored form of a spectrum', () => {
  const spectra = fc
    .tuple(history, fc.constantFrom(0, 0.01, 1), fc.integer({ min: -20000, max: 20000 }))
    .map(([loads, step, day]) => spectrumOf(loads, { step, day: loads.map((_, i) => day + (i >> 3)) }));

  it('reads back as the same spectrum', () => {
    fc.assert(
      fc.property(spectra, (spectrum) => {
        expect(decodeSpectrum(encodeSpectrum(spectrum))).toEqual(spectrum);
      }),
    );
  });

  it('is refused when a byte is changed or missing', () => {
    fc.assert(
      fc.property(spectra, fc.nat(), fc.integer({ min: 1, max: 255 }), (spectrum, place, change) => {
        const bytes = encodeSpectrum(spectrum);
        const changed = bytes.slice();
        changed[place % bytes.length] ^= change;
        expect(() => decodeSpectrum(changed)).toThrow(/version|cut short or changed/);
        expect(() => decodeSpectrum(bytes.slice(0, place % bytes.length))).toThrow(/empty|cut short/);
      }),
    );
  });
});
