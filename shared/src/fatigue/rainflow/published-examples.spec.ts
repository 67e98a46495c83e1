import { describe, expect, it } from 'vitest';
import { astmCounts } from './astm-counts.js';
import { closeTies } from './close-ties.js';
import type { CycleCount } from './cycle-count.js';
import { fourPoint } from './four-point.js';
import { mergeSpectra } from './merge-spectra.js';
import { racetrack } from './racetrack.js';
import { repeatedBlock } from './repeated-block.js';
import { spectrumOf } from './spectrum-of.js';
import { turningPoints } from './turning-points.js';

const EXAMPLE = [-2, 1, -3, 5, -1, 3, -4, 4, -2];
const TUTORIAL = [2, 5, 3, 6, 2, 4, 1, 6, 1, 4, 1, 5, 3, 6, 3, 6, 1, 5, 2];

function byRange(counts: CycleCount[]): Record<number, number> {
  const sums: Record<number, number> = {};
  for (const { range, count } of counts) sums[range] = (sums[range] ?? 0) + count;
  return sums;
}

function moment(counts: CycleCount[], power: number): number {
  return counts.reduce((sum, { range, count }) => sum + count * range ** power, 0);
}

/** Closed cycles of a spectrum of one day as [low, high, count]. */
function cyclesOf(loads: number[], step = 1): number[][] {
  return spectrumOf(loads, { step }).days.flatMap(({ cycles: { low, high, count } }) =>
    Array.from(count, (cycles, i) => [low[i], high[i], cycles]),
  );
}

describe('the example of ASTM E1049-85 (2017), 5.4.4, step by step', () => {
  it('turns at every sample', () => {
    expect([...turningPoints(EXAMPLE)]).toEqual(EXAMPLE);
    expect(spectrumOf(EXAMPLE).turningPoints).toBe(9);
  });

  // RF-03. Step 3 of the standard's table: the one pair counted as a whole cycle is -1 to 3.
  it('closes one cycle, from -1 to 3', () => {
    expect(fourPoint(EXAMPLE).closed).toEqual([[-1, 3]]);
    expect(cyclesOf(EXAMPLE)).toEqual([[-1, 3, 1]]);
  });

  // RF-03. What the standard counts in halves (steps 1, 2, 4, 5 and the end) stands here in a row.
  it('leaves the residue', () => {
    const residue = [-2, 1, -3, 5, -4, 4, -2];
    expect(fourPoint(EXAMPLE).residue).toEqual(residue);
    expect([...spectrumOf(EXAMPLE).residue]).toEqual(residue);
    expect(closeTies(spectrumOf(EXAMPLE))).toEqual({ closedCycles: 1, residue });
  });

  // The seven rows of the standard's table (figure 6): range, mean, count; rows of equal range and mean added.
  it('counts what the table of the standard counts', () => {
    expect(astmCounts(spectrumOf(EXAMPLE))).toEqual([
      { range: 3, mean: -0.5, count: 0.5 },
      { range: 4, mean: -1, count: 0.5 },
      { range: 4, mean: 1, count: 1 },
      { range: 6, mean: 1, count: 0.5 },
      { range: 8, mean: 0, count: 0.5 },
      { range: 8, mean: 1, count: 0.5 },
      { range: 9, mean: 0.5, count: 0.5 },
    ]);
  });

  // RF-02, the aggregate of the standard. RF-05 by hand: 0.5*27 + 1.5*64 + 0.5*216 + 512 + 0.5*729 = 1094 and
  // 0.5*243 + 1.5*1024 + 0.5*7776 + 32768 + 0.5*59049 = 67838.
  it('adds up by range', () => {
    const counts = astmCounts(spectrumOf(EXAMPLE));
    expect(byRange(counts)).toEqual({ 3: 0.5, 4: 1.5, 6: 0.5, 8: 1, 9: 0.5 });
    expect(moment(counts, 3)).toBe(1094);
    expect(moment(counts, 5)).toBe(67838);
  });

  // RF-04, ASTM E1049-85 5.4.5. RF-06 by hand: 27 + 64 + 343 + 729 = 1163; 243 + 1024 + 16807 + 59049 = 77123.
  it('counts the same history repeated for ever', () => {
    const counts = repeatedBlock(spectrumOf(EXAMPLE));
    expect(byRange(counts)).toEqual({ 3: 1, 4: 1, 7: 1, 9: 1 });
    expect(moment(counts, 3)).toBe(1163);
    expect(moment(counts, 5)).toBe(77123);
  });

  // RF-13: two chunks, neither of which closes a cycle, joined.
  it('comes out the same from two chunks', () => {
    const first = spectrumOf(EXAMPLE.slice(0, 5));
    const second = spectrumOf(EXAMPLE.slice(5));
    expect([first.days, second.days]).toEqual([[], []]);
    expect(mergeSpectra(first, second)).toEqual(spectrumOf(EXAMPLE));
  });
});

describe('further published examples', () => {
  // RF-01, derived by hand: plateaus count once, the first and the last sample stay.
  it('RF-01: turning points of a history with plateaus', () => {
    expect([...turningPoints([0, 0, 3, 3, 3, 1, 1, 4, 4, 0])]).toEqual([0, 3, 1, 4, 0]);
    expect([...spectrumOf([0, 0, 3, 3, 3, 1, 1, 4, 4, 0]).residue]).toEqual([0, 4, 0]);
    expect(cyclesOf([0, 0, 3, 3, 3, 1, 1, 4, 4, 0])).toEqual([[1, 3, 1]]);
  });

  // RF-07, public tutorial example, repeated in the README and validate.m of a-ma72/rainflow.
  it('RF-07: four-point cycles and residue of the tutorial example', () => {
    const { closed, residue } = fourPoint(turningPoints(TUTORIAL));
    const inOrder = [...closed].sort(([a, b], [c, d]) => a - c || b - d);
    expect(inOrder).toEqual([
      [1, 4],
      [1, 6],
      [1, 6],
      [2, 4],
      [5, 3],
      [5, 3],
      [6, 3],
    ]);
    expect(residue).toEqual([2, 6, 1, 5, 2]);
    expect(closeTies(spectrumOf(TUTORIAL))).toEqual({ closedCycles: 7, residue: [2, 6, 1, 5, 2] });
  });

  // RF-08 and RF-09, derived from RF-07: closed cycles 2: (5,3)(5,3)(2,4), 3: (6,3)(1,4), 5: (1,6)(1,6);
  // residue halves 4, 5, 4, 3; closed for ever the residue gives 5 (6-1) and 3 (5-2).
  it('RF-08, RF-09: counts of the tutorial example', () => {
    expect(byRange(astmCounts(spectrumOf(TUTORIAL)))).toEqual({ 2: 3, 3: 2.5, 4: 1, 5: 2.5 });
    expect(byRange(repeatedBlock(spectrumOf(TUTORIAL)))).toEqual({ 2: 3, 3: 3, 5: 3 });
  });

  // RF-10, RF-11 and a third: trivial cases in the test data of dpzhuX/ffpack for ASTM E1049-85.
  it('RF-10, RF-11: three short histories', () => {
    expect(byRange(astmCounts(spectrumOf([-1, 3, -0.5, 1, -2])))).toEqual({ 1.5: 1, 4: 0.5, 5: 0.5 });
    expect(byRange(astmCounts(spectrumOf([-1, 1, -3, 3, 2])))).toEqual({ 1: 0.5, 2: 0.5, 4: 0.5, 6: 0.5 });
    expect(byRange(astmCounts(spectrumOf([0, 2.5, 0, 3])))).toEqual({ 2.5: 1, 3: 0.5 });
  });

  // RF-12, derived: E1049 gives four halves, the four-point method one whole and two halves; both make 2.
  it('RF-12: ties split differently and add up to the same', () => {
    expect(byRange(astmCounts(spectrumOf([0, 1, 0, 1, 0])))).toEqual({ 1: 2 });
    expect(fourPoint([0, 1, 0, 1, 0])).toEqual({ closed: [[1, 0]], residue: [0, 1, 0] });
    expect(closeTies(spectrumOf([1, 0, 1, 0]))).toEqual({ closedCycles: 1, residue: [1, 0] });
  });

  // RF-14, derived by hand.
  it('RF-14: the racetrack filter', () => {
    expect(racetrack([0, 1, 0.6, 2, -1, -0.7, -3, 4], 0.5)).toEqual([0, 2, -3, 4]);
  });

  // RF-15, cycles of Shigley's Mechanical Engineering Design, 9th ed., p. 322 (ksi); the order is ours.
  it('RF-15: the hidden cycle of the textbook', () => {
    const history = [80, 40, 60, -40, -20, -60, 80];
    expect(cyclesOf(history)).toEqual([
      [-40, -20, 1],
      [40, 60, 1],
    ]);
    expect([...spectrumOf(history).residue]).toEqual([80, -60, 80]);
    const amplitudes = astmCounts(spectrumOf(history)).map(({ range, mean }) => [range / 2, mean]);
    expect(amplitudes).toEqual([
      [10, -30],
      [10, 50],
      [70, 10],
    ]);
  });

  // RF-16, derived: ten periods from the mean upwards close nine cycles from trough to crest; the last sample is
  // 10 + 5 sin(2 pi 199/20) = 8.455.
  it('RF-16: a sampled sine', () => {
    const sine = Array.from({ length: 200 }, (_, i) =>
      Math.round(1000 * (10 + 5 * Math.sin((2 * Math.PI * i) / 20))),
    );
    const { closed, residue } = fourPoint(turningPoints(sine));
    expect(closed).toEqual(Array.from({ length: 9 }, () => [5000, 15000]));
    expect(residue).toEqual([10000, 15000, 5000, 8455]);
    expect(closeTies(spectrumOf(sine, { step: 1 }))).toEqual({ closedCycles: 9, residue });
    // 9 whole cycles of range 10000, and the halves 10000 to 15000, 15000 to 5000 and 5000 to 8455.
    expect(byRange(astmCounts(spectrumOf(sine)))).toEqual({ 3455: 0.5, 5000: 0.5, 10000: 9.5 });
  });

  // One-line cases from a-ma72/rainflow.
  it('closes the inner pair of four points either way up', () => {
    expect(fourPoint([1, 3, 2, 4])).toEqual({ closed: [[3, 2]], residue: [1, 4] });
    expect(fourPoint([4, 2, 3, 1])).toEqual({ closed: [[2, 3]], residue: [4, 1] });
  });
});
