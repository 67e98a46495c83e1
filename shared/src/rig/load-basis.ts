import { positionKind, positionLabel, type Side } from './positions.js';

/** Where a place's loads can come from. */
export type LoadBasisKind = 'measured' | 'mirrored' | 'in-line' | 'none';

/** A place, as far as its loads are concerned. */
export interface PlaceWithLoads {
  id: string;
  kind: string;
  side: Side;
  mast: string;
  label: string;
}

/** A sensor in place. */
export interface PlacedSensor {
  name: string;
  positionId: string;
  /** Places stated to carry the same load with nothing joining in between. */
  inLine: readonly string[];
}

/** The basis of one place, in words, and what would better it. */
export interface LoadBasisOfPlace {
  positionId: string;
  basis: LoadBasisKind;
  /** The measured place behind 'mirrored' and 'in-line'. */
  throughPositionId: string | null;
  words: string;
  /** null where nothing is better, and for running rigging. */
  improve: string | null;
}

/**
 * Where the loads of each place can come from: a sensor of its own, a place stated to be in line, its twin on the other
 * side, or nowhere. Geometry alone never carries a load to another part. A stated line of load goes before a mirror,
 * which holds only where both tacks were logged and doubts its gain by 0.15 (engineering estimate, no source).
 *
 * @returns one item for each place, in the order given
 */
export function loadBases(
  places: readonly PlaceWithLoads[],
  sensors: readonly PlacedSensor[],
): LoadBasisOfPlace[] {
  return places.map((place) => {
    const { standing } = positionKind(place.kind) ?? { standing: true };
    const base = { positionId: place.id, throughPositionId: null };
    const own = sensors.find(({ positionId }) => positionId === place.id);
    if (own) {
      return { ...base, basis: 'measured', words: `Measured by ${own.name}.`, improve: null };
    }
    const inLine = sensors.find((sensor) => sensor.inLine.includes(place.id));
    if (inLine) {
      return {
        ...base,
        basis: 'in-line',
        throughPositionId: inLine.positionId,
        words: `In line with ${labelOf(places, inLine.positionId)}, which ${inLine.name} measures.`,
        improve: 'A sensor of its own would take away the doubt that nothing joins in between.',
      };
    }
    const twin = places.find((other) => isTwin(place, other));
    const twinSensor = twin && sensors.find(({ positionId }) => positionId === twin.id);
    if (twin && twinSensor) {
      return {
        ...base,
        basis: 'mirrored',
        throughPositionId: twin.id,
        words: `Can be mirrored from ${twin.label}, where both tacks are logged.`,
        improve: 'A sensor of its own would show how evenly the two sides are loaded.',
      };
    }
    return {
      ...base,
      basis: 'none',
      words: standing ? 'No sensor reaches it.' : 'Running rigging: registered, not assessed.',
      improve: standing ? improvementFor(place, twin) : null,
    };
  });
}

/** True for the same stay of the same mast on the other side. */
export function isTwin(
  place: Pick<PlaceWithLoads, 'kind' | 'side' | 'mast'>,
  other: Pick<PlaceWithLoads, 'kind' | 'side' | 'mast'>,
): boolean {
  return (
    place.side !== 'centre' &&
    other.side !== 'centre' &&
    other.side !== place.side &&
    other.kind === place.kind &&
    other.mast === place.mast
  );
}

function improvementFor(place: PlaceWithLoads, twin: PlaceWithLoads | undefined): string {
  const choices = ['a load pin in its turnbuckle'];
  if (twin) choices.push(`one in ${twin.label}`);
  if (place.kind.startsWith('backstay')) choices.push('the pressure of its ram');
  const last = choices.pop();
  const words = choices.length > 0 ? `${choices.join(', ')} or ${last}` : (last ?? '');
  return `${words.charAt(0).toUpperCase()}${words.slice(1)} would give it a load basis.`;
}

function labelOf(places: readonly PlaceWithLoads[], id: string): string {
  const place = places.find((candidate) => candidate.id === id);
  return place ? place.label : positionLabel('a place that is gone', 'centre');
}
