/** How alike the seasons of a vessel are. */
export type SeasonKind = 'fixed-itinerary' | 'ordinary' | 'charter';

const COV: Readonly<Record<SeasonKind, number>> = { 'fixed-itinerary': 0.2, ordinary: 0.3, charter: 0.5 };

/**
 * Spread of damage per hour from one season to another, as coefficient of variation. It stands for every season by
 * itself: a rate recorded over several seasons is doubted less because their factors average out.
 * Engineering estimates without a source.
 */
export function seasonCov(kind: SeasonKind): number {
  return COV[kind];
}
