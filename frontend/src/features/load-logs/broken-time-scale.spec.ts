import { describe, expect, it } from 'vitest';
import { brokenTimeScale, recordedStretches } from './broken-time-scale';

const envelope = (atMs: number[]) => ({ atMs, lowKn: atMs.map(() => 0), highKn: atMs.map(() => 1) });
const every = (from: number, to: number, step: number): number[] =>
  Array.from({ length: (to - from) / step + 1 }, (_, index) => from + index * step);

describe('recordedStretches', () => {
  it('cuts at long pauses and bridges short ones', () => {
    // 100 + 100 recorded; the pause of 3 is under 2 % of it, the pause of 800 is not.
    const atMs = [...every(0, 50, 1), ...every(53, 100, 1), ...every(900, 1000, 1)];
    expect(recordedStretches([envelope(atMs)])).toEqual([
      { fromMs: 0, toMs: 100 },
      { fromMs: 900, toMs: 1000 },
    ]);
  });

  it('takes a time as recorded when any channel was', () => {
    expect(recordedStretches([envelope(every(0, 60, 1)), envelope(every(40, 100, 1))])).toEqual([
      { fromMs: 0, toMs: 100 },
    ]);
  });
});

describe('brokenTimeScale', () => {
  const scale = brokenTimeScale(
    [
      { fromMs: 0, toMs: 100 },
      { fromMs: 900, toMs: 1200 },
    ],
    416,
  );

  it('keeps lengths true and gives each break a fixed width', () => {
    // 416 px less one break of 16 leave 400 px for 400 ms: one pixel each.
    expect(scale.stretches.map(({ fromX, toX }) => [fromX, toX])).toEqual([
      [0, 100],
      [116, 416],
    ]);
    expect(scale.xOf(50)).toBe(50);
    expect(scale.xOf(1000)).toBe(216);
  });

  it('puts what lies in a pause into the break', () => {
    expect(scale.xOf(500)).toBe(108);
    expect(scale.xOf(-5)).toBe(0);
    expect(scale.xOf(5000)).toBe(416);
  });

  it('finds the instant of a place, in a break the nearer end', () => {
    expect(scale.msOf(30)).toBe(30);
    expect(scale.msOf(216)).toBe(1000);
    expect(scale.msOf(103)).toBe(100);
    expect(scale.msOf(114)).toBe(900);
  });

  it('bounds the breaks when there are many of them', () => {
    const many = brokenTimeScale(
      every(0, 60, 1).map((index) => ({ fromMs: index * 100, toMs: index * 100 + 10 })),
      300,
    );
    const drawn = many.stretches.reduce((sum, { fromX, toX }) => sum + toX - fromX, 0);
    expect(drawn).toBeCloseTo(225, 6);
  });

  it('stands one instant and none', () => {
    expect(brokenTimeScale([{ fromMs: 7, toMs: 7 }], 100).msOf(40)).toBe(7);
    expect(brokenTimeScale([], 100).xOf(7)).toBe(0);
  });
});
