import { describe, expect, it } from 'vitest';
import { mirrored, pointOnMast, spreaderTip, stayLengthM, type MastGeometry } from '../geometry.js';
import { positionLabel } from '../positions.js';
import { rigTemplate } from './rig-template.js';
import { suggestPositionGeometry } from './suggest-position-geometry.js';
import { RIG_TEMPLATE_KEYS, RIG_TEMPLATE_NAMES, templateForRigType } from './template-keys.js';

const PLUMB: MastGeometry = {
  key: 'main',
  footAftM: 4,
  footUpM: 0.5,
  heightM: 12,
  houndsHeightM: 12,
  rakeDegrees: 0,
  stayed: true,
  spreaders: [{ heightM: 6, lengthM: 1, sweepDegrees: 0 }],
};

describe('points of a rig', () => {
  it('stand on the mast at their height, aft of the foot where the mast rakes', () => {
    expect(pointOnMast(PLUMB, 6)).toEqual({ aftM: 4, starboardM: 0, upM: 6.5 });
    // A mast of 10 m leaning 30 degrees: 10 sin 30 = 5 m aft, 10 cos 30 = 8.660 m up.
    const raked = pointOnMast({ ...PLUMB, footUpM: 0, rakeDegrees: 30 }, 10);
    expect(raked.aftM).toBeCloseTo(9, 9);
    expect(raked.upM).toBeCloseTo(8.660254, 6);
  });

  it('put spreader tips outboard, port negative, and aft by their sweep', () => {
    expect(spreaderTip(PLUMB, PLUMB.spreaders[0], 'port')).toEqual({ aftM: 4, starboardM: -1, upM: 6.5 });
    const swept = spreaderTip(PLUMB, { heightM: 6, lengthM: 2, sweepDegrees: 30 }, 'starboard');
    // 2 sin 30 = 1 aft, 2 cos 30 = 1.732 out.
    expect(swept.aftM).toBeCloseTo(5, 9);
    expect(swept.starboardM).toBeCloseTo(1.7320508, 6);
  });

  it('measure a stay along its path', () => {
    // Legs of 3-4-5 and 5-12-13 triangles.
    const stay = {
      lower: { aftM: 0, starboardM: 3, upM: 0 },
      via: [{ aftM: 0, starboardM: 0, upM: 4 }],
      upper: { aftM: 5, starboardM: 0, upM: 16 },
    };
    expect(stayLengthM(stay)).toBeCloseTo(18, 12);
    expect(stayLengthM(mirrored(stay))).toBeCloseTo(18, 12);
    expect(mirrored(stay).lower.starboardM).toBe(-3);
    expect(Object.is(mirrored(stay).upper.starboardM, 0)).toBe(true);
  });
});

describe.each(RIG_TEMPLATE_KEYS)('the template %s', (key) => {
  const rig = rigTemplate(key, { lengthM: 12 });

  it('names every place once', () => {
    const labels = rig.positions.map(({ kind, side, mast }) => `${positionLabel(kind, side)} ${mast}`);
    expect(new Set(labels).size).toBe(labels.length);
    expect(RIG_TEMPLATE_NAMES[key]).not.toBe('');
  });

  it('gives every place a run from below to above, on its own side', () => {
    for (const { kind, side, geometry } of rig.positions) {
      if (!geometry) throw new Error(`${kind} has no run`);
      expect(stayLengthM(geometry), kind).toBeGreaterThan(0.5);
      if (kind !== 'triatic') expect(geometry.upper.upM, kind).toBeGreaterThan(geometry.lower.upM);
      const sign = { port: -1, centre: 0, starboard: 1 }[side];
      expect(Math.sign(geometry.lower.starboardM), kind).toBe(sign);
    }
  });

  it('mirrors port and starboard', () => {
    for (const { kind, mast, geometry } of rig.positions.filter(({ side }) => side === 'port')) {
      const other = rig.positions.find(
        (place) => place.kind === kind && place.mast === mast && place.side === 'starboard',
      );
      expect(geometry && mirrored(geometry)).toEqual(other?.geometry);
    }
  });

  it('holds every stayed mast from ahead or abeam on both sides, and no unstayed one', () => {
    for (const mast of rig.geometry.masts) {
      const kinds = rig.positions.filter((place) => place.mast === mast.key).map(({ kind }) => kind);
      if (mast.stayed) expect(kinds.filter((kind) => kind === 'cap-shroud')).toHaveLength(2);
      else expect(kinds).toEqual([]);
    }
  });

  it('grows with the vessel', () => {
    const larger = rigTemplate(key, { lengthM: 24 });
    rig.geometry.masts.forEach((mast, index) => {
      expect(larger.geometry.masts[index].heightM).toBeCloseTo(2 * mast.heightM, 1);
    });
  });
});

describe('choices of a template', () => {
  it('draw as many spreaders as were said, with intermediates from two pairs on', () => {
    const one = rigTemplate('masthead-sloop', { lengthM: 10, spreaders: 1 });
    const three = rigTemplate('masthead-sloop', { lengthM: 10, spreaders: 3 });
    expect(one.geometry.masts[0].spreaders).toHaveLength(1);
    expect(one.positions.some(({ kind }) => kind === 'intermediate')).toBe(false);
    expect(three.geometry.masts[0].spreaders).toHaveLength(3);
    expect(three.positions.filter(({ kind }) => kind === 'intermediate')).toHaveLength(2);
    const [low, middle, high] = three.geometry.masts[0].spreaders;
    expect(low.heightM < middle.heightM && middle.heightM < high.heightM).toBe(true);
    expect(low.lengthM > middle.lengthM && middle.lengthM > high.lengthM).toBe(true);
  });

  it('follow the stated rig type, and fall back to a sloop', () => {
    expect(templateForRigType('ketch')).toBe('ketch');
    expect(templateForRigType('other')).toBe('masthead-sloop');
  });

  it('refuse a length that is not one', () => {
    expect(() => rigTemplate('cutter', { lengthM: 0 })).toThrow(RangeError);
  });
});

describe('the usual run of a stay', () => {
  const { geometry: rig } = rigTemplate('masthead-sloop', { lengthM: 12, spreaders: 2 });
  const cutter = rigTemplate('cutter', { lengthM: 12 }).geometry;

  it('goes from the bow, or the tip of the bowsprit, to the hounds', () => {
    const stay = suggestPositionGeometry({ kind: 'forestay', side: 'centre', mast: 'main' }, rig);
    expect(stay?.lower).toEqual({ aftM: 0, starboardM: 0, upM: 0 });
    const onSprit = suggestPositionGeometry({ kind: 'forestay', side: 'centre', mast: 'main' }, cutter);
    expect(onSprit?.lower).toEqual(cutter.bowspritTip);
  });

  it('passes every spreader of a continuous cap shroud and ends at the first of a discontinuous one', () => {
    const place = { kind: 'cap-shroud', side: 'port', mast: 'main' } as const;
    expect(suggestPositionGeometry(place, rig)?.via).toHaveLength(2);
    const piece = suggestPositionGeometry({ ...place, discontinuous: true }, rig);
    const above = suggestPositionGeometry({ ...place, kind: 'vertical-2', discontinuous: true }, rig);
    expect(piece?.via).toEqual([]);
    expect(above?.lower).toEqual(piece?.upper);
    expect(above?.upper).toEqual(pointOnMast(rig.masts[0], rig.masts[0].houndsHeightM));
  });

  it('does not exist for running rigging, an absent mast, or a bobstay without a bowsprit', () => {
    expect(suggestPositionGeometry({ kind: 'halyard', side: 'centre', mast: 'main' }, rig)).toBeNull();
    expect(suggestPositionGeometry({ kind: 'forestay', side: 'centre', mast: 'fore' }, rig)).toBeNull();
    expect(suggestPositionGeometry({ kind: 'bobstay', side: 'centre', mast: 'main' }, rig)).toBeNull();
  });
});
