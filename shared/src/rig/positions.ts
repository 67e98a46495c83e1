/** Side of the vessel a position is on. */
export type Side = 'port' | 'starboard' | 'centre';

/** A kind of place on a rig, in the trade's words. */
export interface PositionKind {
  kind: string;
  /** Full word, lower case, as it stands in a sentence. */
  name: string;
  /** Short name riggers write (V1, D1); null where the trade has none. */
  alias: string | null;
  /** Sides such a place usually exists on. */
  sides: Side[];
  /** Order along the rig: headstays from the bow aft, then athwartships from the top down, then backstays, then bowsprit. */
  order: number;
  /** False for running rigging, which is registered and not assessed. */
  standing: boolean;
  /** True where the loss of one part there drops the mast (common practice, no source). */
  lossDropsMast: boolean;
  note: string;
}

const BOTH: Side[] = ['port', 'starboard'];
const CENTRE: Side[] = ['centre'];

/**
 * The places of a rig, in rig order. Which loss drops a mast is common practice without a source; a rig with two of a
 * kind side by side may stand on one, and a surveyor can say so on the vessel.
 */
export const POSITION_KINDS: readonly PositionKind[] = [
  standing('forestay', 'forestay', null, CENTRE, 10, true, 'From the bow to the masthead or the hounds.'),
  standing(
    'inner-forestay',
    'inner forestay',
    null,
    CENTRE,
    20,
    false,
    'Second stay forward of the mast, for a staysail.',
  ),
  standing(
    'babystay',
    'babystay',
    null,
    CENTRE,
    30,
    false,
    'Short stay that steadies the middle of the mast.',
  ),
  standing(
    'jumper',
    'jumper stay',
    null,
    BOTH,
    40,
    false,
    'Over the jumper struts, keeps the topmast straight.',
  ),
  standing(
    'cap-shroud',
    'cap shroud',
    'V1',
    BOTH,
    50,
    true,
    'From the chainplate over the spreader tips to the top.',
  ),
  standing(
    'vertical-2',
    'cap shroud above the first spreader',
    'V2',
    BOTH,
    55,
    true,
    'Discontinuous rigs: first to second spreader.',
  ),
  standing(
    'vertical-3',
    'cap shroud above the second spreader',
    'V3',
    BOTH,
    56,
    true,
    'Discontinuous rigs: second to third spreader.',
  ),
  standing(
    'lower',
    'lower shroud',
    'D1',
    BOTH,
    60,
    true,
    'From the chainplate to the root of the lowest spreader.',
  ),
  standing(
    'lower-forward',
    'forward lower shroud',
    'D1 forward',
    BOTH,
    61,
    true,
    'The forward one of a pair of lowers.',
  ),
  standing('lower-aft', 'aft lower shroud', 'D1 aft', BOTH, 62, true, 'The after one of a pair of lowers.'),
  standing(
    'intermediate',
    'intermediate shroud',
    'D2',
    BOTH,
    70,
    true,
    'From a spreader tip or chainplate to the root of the second spreader.',
  ),
  standing(
    'intermediate-3',
    'upper intermediate shroud',
    'D3',
    BOTH,
    71,
    true,
    'To the root of the third spreader.',
  ),
  standing('diamond', 'diamond stay', null, BOTH, 80, false, 'Closed round the mast over its own spreaders.'),
  standing('backstay', 'backstay', null, CENTRE, 90, true, 'From the masthead to the stern; one leg or two.'),
  standing('backstay-leg', 'backstay leg', null, BOTH, 91, false, 'Lower leg of a split backstay.'),
  standing(
    'running-backstay',
    'running backstay (runner)',
    null,
    BOTH,
    92,
    true,
    'Set up on the windward side only.',
  ),
  standing('checkstay', 'checkstay', null, BOTH, 93, false, 'From the runner to the middle of the mast.'),
  standing('triatic', 'triatic stay', null, CENTRE, 94, false, 'From masthead to masthead.'),
  standing('bobstay', 'bobstay', null, CENTRE, 100, true, 'Holds the bowsprit down against the forestay.'),
  standing('whisker-stay', 'whisker stay', null, BOTH, 101, false, 'Holds the bowsprit sideways.'),
  running('halyard', 'halyard', 110),
  running('sheet', 'sheet', 111),
  running('topping-lift', 'topping lift', 112),
];

/**
 * The kind of position with this key.
 *
 * @returns undefined for a key that is not in {@link POSITION_KINDS}
 */
export function positionKind(kind: string): PositionKind | undefined {
  return POSITION_KINDS.find((candidate) => candidate.kind === kind);
}

/**
 * What a position is called when nobody named it: "Cap shroud, port", "Forestay", "Mizzen backstay".
 *
 * @param kind key of the position; an unknown one is used as it stands
 * @param mast 'main' is not spoken; any other mast comes first
 */
export function positionLabel(kind: string, side: Side, mast = 'main'): string {
  const name = positionKind(kind)?.name ?? kind;
  const words = mast === 'main' ? name : `${mast} ${name}`;
  const label = words.charAt(0).toUpperCase() + words.slice(1);
  return side === 'centre' ? label : `${label}, ${side}`;
}

function standing(
  kind: string,
  name: string,
  alias: string | null,
  sides: Side[],
  order: number,
  lossDropsMast: boolean,
  note: string,
): PositionKind {
  return { kind, name, alias, sides, order, standing: true, lossDropsMast, note };
}

function running(kind: string, name: string, order: number): PositionKind {
  return {
    kind,
    name,
    alias: null,
    sides: CENTRE,
    order,
    standing: false,
    lossDropsMast: false,
    note: 'Running rigging: registered, not assessed.',
  };
}
