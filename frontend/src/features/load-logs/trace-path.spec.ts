import { describe, expect, it } from 'vitest';
import { loadTicks, nearestIndex, tracePath, unbrokenStretches } from './trace-path';

const scale = { xOf: (atMs: number) => 2 * atMs, lowKn: 0, highKn: 10, height: 50 };

describe('tracePath', () => {
  it('goes along the highest loads and back along the lowest', () => {
    // x = 2 at; y = 50 - kn / 10 * 50.
    const path = tracePath({ atMs: [0, 50, 100], lowKn: [0, 2, 1], highKn: [4, 10, 6] }, scale);
    expect(path).toBe('M0.0 30.0L100.0 0.0L200.0 20.0L200.0 45.0L100.0 40.0L0.0 50.0Z');
  });

  it('leaves a hole where data are missing', () => {
    const atMs = [0, 10, 20, 80, 90, 100];
    expect(unbrokenStretches(atMs)).toEqual([
      [0, 2],
      [3, 5],
    ]);
    const path = tracePath({ atMs, lowKn: atMs.map(() => 1), highKn: atMs.map(() => 2) }, scale);
    expect(path.match(/M/g)).toHaveLength(2);
  });

  it('stands empty, single and constant series', () => {
    expect(tracePath({ atMs: [], lowKn: [], highKn: [] }, scale)).toBe('');
    expect(tracePath({ atMs: [0], lowKn: [3], highKn: [3] }, { ...scale, lowKn: 3, highKn: 3 })).toBe(
      'M0.0 50.0L0.0 50.0Z',
    );
  });
});

describe('nearestIndex', () => {
  it('takes the nearest stretch, the earlier of two equally near', () => {
    expect(nearestIndex([0, 10, 20], 14)).toBe(1);
    expect(nearestIndex([0, 10, 20], 15)).toBe(1);
    expect(nearestIndex([0, 10, 20], 500)).toBe(2);
    expect(nearestIndex([], 5)).toBe(-1);
  });
});

describe('loadTicks', () => {
  it('is round and holds both ends', () => {
    expect(loadTicks(0, 19.3)).toEqual([0, 5, 10, 15, 20]);
    expect(loadTicks(-1.2, 0.9)).toEqual([-2, -1, 0, 1]);
    expect(loadTicks(0, 0.35)).toEqual([0, 0.1, 0.2, 0.3, 0.4]);
  });

  it('gives the one value of a constant series', () => {
    expect(loadTicks(3, 3)).toEqual([3]);
  });
});
