import type { Side } from '@stayledger/shared/rig/positions';

/** "Cap shroud, port"; the mast stands behind it where it is not the main one: "Cap shroud, port (mizzen mast)". */
export function positionLabel(kindName: string, side: Side, mast: string): string {
  const name = kindName.charAt(0).toUpperCase() + kindName.slice(1);
  const place = side === 'centre' ? name : `${name}, ${side}`;
  return mast === 'main' ? place : `${place} (${mast} mast)`;
}
