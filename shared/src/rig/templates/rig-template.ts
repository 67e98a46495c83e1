import type { PositionGeometry, RigGeometry } from '../geometry.js';
import { positionKind, type Side } from '../positions.js';
import { suggestGeometry, type KnownSizes } from './suggest-geometry.js';
import { suggestPositionGeometry } from './suggest-position-geometry.js';
import type { RigTemplateKey } from './template-keys.js';

/** One place a template creates. */
export interface TemplatePosition {
  kind: string;
  side: Side;
  mast: string;
  geometry: PositionGeometry | null;
}

/** A rig to start from: hull, masts, and the places of its standing rigging in rig order. */
export interface RigTemplate {
  geometry: RigGeometry;
  positions: TemplatePosition[];
}

/** Kinds of stays of each mast, by template; both sides are made where a kind stands on both. Common practice, no source. */
const STAYS: Readonly<Record<RigTemplateKey, Readonly<Record<string, readonly string[]>>>> = {
  'masthead-sloop': {
    main: ['forestay', 'cap-shroud', 'lower-forward', 'lower-aft', 'intermediate', 'backstay'],
  },
  'fractional-sloop': { main: ['forestay', 'cap-shroud', 'lower', 'intermediate', 'backstay'] },
  cutter: {
    main: [
      'forestay',
      'inner-forestay',
      'cap-shroud',
      'lower-forward',
      'lower-aft',
      'intermediate',
      'backstay',
      'running-backstay',
      'bobstay',
      'whisker-stay',
    ],
  },
  ketch: {
    main: [
      'forestay',
      'inner-forestay',
      'cap-shroud',
      'lower-forward',
      'lower-aft',
      'running-backstay',
      'triatic',
      'bobstay',
      'whisker-stay',
    ],
    mizzen: ['cap-shroud', 'lower-forward', 'lower-aft'],
  },
  yawl: {
    main: ['forestay', 'cap-shroud', 'lower-forward', 'lower-aft', 'intermediate', 'running-backstay'],
    mizzen: ['cap-shroud', 'lower-forward'],
  },
  schooner: {
    fore: [
      'forestay',
      'inner-forestay',
      'cap-shroud',
      'lower-forward',
      'lower-aft',
      'triatic',
      'bobstay',
      'whisker-stay',
    ],
    main: ['cap-shroud', 'lower-forward', 'lower-aft', 'running-backstay'],
  },
  'unstayed-mizzen': { main: ['forestay', 'cap-shroud', 'lower-forward', 'lower-aft', 'backstay'] },
};

/**
 * A rig of a type with plausible geometry: what a person starts from and corrects. Upper intermediates are left out of
 * a mast with fewer than two pairs of spreaders.
 *
 * @throws RangeError for a length that is not above zero
 */
export function rigTemplate(template: RigTemplateKey, sizes: KnownSizes): RigTemplate {
  const geometry = suggestGeometry(template, sizes);
  const positions = Object.entries(STAYS[template]).flatMap(([mast, kinds]) => {
    const pairs = geometry.masts.find(({ key }) => key === mast)?.spreaders.length ?? 0;
    return kinds
      .filter((kind) => kind !== 'intermediate' || pairs > 1)
      .flatMap((kind) =>
        (positionKind(kind)?.sides ?? []).map((side) => ({
          kind,
          side,
          mast,
          geometry: suggestPositionGeometry({ kind, side, mast }, geometry),
        })),
      );
  });
  return { geometry, positions };
}
