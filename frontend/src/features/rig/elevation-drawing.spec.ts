import type { PositionGeometry, RigGeometry } from '@stayledger/shared/rig/geometry';
import { describe, expect, it } from 'vitest';
import { elevationDrawing, placeMarks } from './elevation-drawing';

/** A mast of 12 m at 4 m from the bow of a hull of 10 m by 3 m. */
const rig: RigGeometry = {
  deckLengthM: 10,
  beamM: 3,
  bowspritTip: null,
  masts: [
    {
      key: 'main',
      footAftM: 4,
      footUpM: 0,
      heightM: 12,
      houndsHeightM: 12,
      rakeDegrees: 0,
      spreaders: [{ heightM: 6, lengthM: 1, sweepDegrees: 0 }],
      stayed: true,
    },
  ],
};
const forestay: PositionGeometry = {
  lower: { aftM: 0, starboardM: 0, upM: 0 },
  via: [],
  upper: { aftM: 4, starboardM: 0, upM: 12 },
};
const shroud = (side: 1 | -1): PositionGeometry => ({
  lower: { aftM: 4, starboardM: side * 1.4, upM: 0 },
  via: [{ aftM: 4, starboardM: side, upM: 6 }],
  upper: { aftM: 4, starboardM: 0, upM: 12 },
});
const frame = { width: 400, maxHeight: 500, markSize: 20 };

describe('elevationDrawing', () => {
  const drawing = elevationDrawing(
    rig,
    [
      { id: 'forestay', geometry: forestay },
      { id: 'port', geometry: shroud(-1) },
      { id: 'starboard', geometry: shroud(1) },
    ],
    frame,
  );
  const [stay, port, starboard] = drawing.stays;

  it('keeps the profile true: as many metres up as aft', () => {
    const [foot, head] = stay.path;
    // 4 m aft and 12 m up: the same scale on both axes gives a ratio of 3.
    expect((foot.y - head.y) / (head.x - foot.x)).toBeCloseTo(3, 1);
  });

  it('ends each line where the mast ends and leads shrouds over the spreader', () => {
    const [, masthead] = drawing.masts[0];
    for (const { path } of drawing.stays) expect(path.at(-1)).toEqual(masthead);
    expect(port.path[1]).toEqual(drawing.spreaders[0][0]);
    expect(starboard.path[1]).toEqual(drawing.spreaders[0][2]);
  });

  it('shows port and starboard apart, starboard nearer to whoever looks', () => {
    expect(starboard.path[0].x).toBeGreaterThan(port.path[0].x);
    expect(starboard.path[0].y).toBeGreaterThan(port.path[0].y);
  });

  it('stays within its frame, marks included, however tall or long the rig is', () => {
    for (const [deckLengthM, heightM] of [
      [10, 12],
      [10, 60],
      [80, 12],
    ]) {
      const drawn = elevationDrawing(
        { ...rig, deckLengthM, masts: [{ ...rig.masts[0], heightM }] },
        [{ id: 'forestay', geometry: forestay }],
        frame,
      );
      const points = [drawn.deck, ...drawn.masts, ...drawn.stays.map(({ path }) => path)].flat();
      for (const { x, y } of points) {
        expect(x).toBeGreaterThanOrEqual(0);
        expect(x).toBeLessThanOrEqual(frame.width);
        expect(y).toBeGreaterThanOrEqual(0);
        expect(y).toBeLessThanOrEqual(drawn.height);
      }
      for (const { mark } of drawn.stays)
        expect(mark.y + frame.markSize / 2).toBeLessThanOrEqual(drawn.height);
    }
  });
});

describe('placeMarks', () => {
  it('puts a mark just below its end', () => {
    expect(placeMarks([{ x: 50, y: 100 }], 20, 200)).toEqual([{ x: 50, y: 112 }]);
  });

  it('lets no two marks touch, even where many parts end at one chainplate', () => {
    const ends = Array.from({ length: 12 }, (_, index) => ({
      x: 100 + (index % 4) * 6,
      y: 300 - (index % 3) * 5,
    }));
    const marks = placeMarks(ends, 20, 400);
    for (let a = 0; a < marks.length; a += 1) {
      for (let b = a + 1; b < marks.length; b += 1) {
        expect(Math.hypot(marks[a].x - marks[b].x, marks[a].y - marks[b].y)).toBeGreaterThanOrEqual(20);
      }
    }
  });

  it('keeps marks at the edge whole', () => {
    const [left, right] = placeMarks(
      [
        { x: 0, y: 10 },
        { x: 200, y: 10 },
      ],
      20,
      200,
    );
    expect(left.x).toBeGreaterThanOrEqual(10);
    expect(right.x).toBeLessThanOrEqual(190);
  });
});
