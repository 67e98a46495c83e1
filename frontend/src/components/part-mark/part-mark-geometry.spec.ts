import { describe, expect, it } from 'vitest';
import { eighthsUsed, partMarkGeometry } from './part-mark-geometry';

describe('eighthsUsed', () => {
  // An eighth is 0.125 of the allowance; the expected steps are counted by hand.
  it.each([
    [0, 0],
    [0.124, 0],
    [0.125, 1],
    [0.67, 5],
    [0.99, 7],
    [1, 8],
    [1.4, 8],
    [-0.1, 0],
  ])('an allowance of %f used fills %i eighths', (used, eighths) => {
    expect(eighthsUsed(used)).toBe(eighths);
  });
});

describe('partMarkGeometry', () => {
  it('raises the ink by one eighth of the section height a step', () => {
    // Size 100: radius 39, centre at y 55, so the foot is at 94, the top at 16 and a step is 78 / 8 = 9.75.
    expect(partMarkGeometry('rod', 100, 1).levelY).toBe(84.25);
    expect(partMarkGeometry('rod', 100, 4).levelY).toBe(55);
    expect(partMarkGeometry('rod', 100, 8).levelY).toBe(16);
  });

  it('has no ink at zero and where nothing is assessed', () => {
    expect(partMarkGeometry('rod', 48, 0).levelY).toBeNull();
    expect(partMarkGeometry('rod', 48, null).levelY).toBeNull();
  });

  it('draws one solid rim at 24 px or less, whatever the kind', () => {
    for (const size of [18, 24]) {
      const rod = partMarkGeometry('rod', size, 3);
      for (const kind of ['strand', 'fibre'] as const) {
        const mark = partMarkGeometry(kind, size, 3);
        expect(mark.rimPath).toBe(rod.rimPath);
        expect(mark.wires).toEqual([]);
        expect(mark.hatches).toEqual([]);
      }
    }
  });

  it('scallops a strand by its twelve outer wires and draws its nineteen wires from 48 px', () => {
    const mark = partMarkGeometry('strand', 48, 3);
    expect(mark.rimPath.match(/A/g)).toHaveLength(12);
    expect(mark.wires).toHaveLength(19);
    for (const wire of mark.wires) {
      const distance = Math.hypot(wire.x - mark.centre.x, wire.y - mark.centre.y);
      expect(distance + wire.radius).toBeLessThanOrEqual(mark.radius + 0.01);
    }
  });

  it('keeps wires apart from each other', () => {
    const { wires } = partMarkGeometry('strand', 160, 3);
    for (let first = 0; first < wires.length; first += 1) {
      for (let second = first + 1; second < wires.length; second += 1) {
        const gap = Math.hypot(wires[first].x - wires[second].x, wires[first].y - wires[second].y);
        expect(gap).toBeGreaterThan(wires[first].radius + wires[second].radius);
      }
    }
  });

  it('hatches the rim of fibre above 24 px only', () => {
    expect(partMarkGeometry('fibre', 48, null).hatches.length).toBeGreaterThan(20);
    expect(partMarkGeometry('rod', 48, 2).hatches).toEqual([]);
  });

  it.each([18, 24, 48, 160])('stays inside its square at %i px', (size) => {
    for (const kind of ['strand', 'rod', 'fibre'] as const) {
      const mark = partMarkGeometry(kind, size, 8);
      // The widest rim is the two pixels of a due part.
      const half = Math.max(2, mark.strokeWidth) / 2;
      expect(mark.centre.x - mark.radius - half).toBeGreaterThanOrEqual(0);
      expect(mark.centre.y + mark.radius + half).toBeLessThanOrEqual(size);
      const numbers = mark.flag.cloth.match(/-?\d+(\.\d+)?/g)?.map(Number) ?? [];
      expect(numbers).toHaveLength(6);
      for (const value of numbers) {
        expect(value).toBeGreaterThanOrEqual(0);
        expect(value).toBeLessThanOrEqual(size);
      }
    }
  });

  it('holds the section in the same place with and without ink', () => {
    expect(partMarkGeometry('rod', 18, 8).centre).toEqual(partMarkGeometry('rod', 18, null).centre);
  });
});
