import type { EntityManager } from '@mikro-orm/postgresql';
import type { LogMapping } from '@stayledger/shared/contracts/load-logs';
import { InvalidRequestError } from '../common/errors/app-error.js';
import { Position } from '../rig/position.entity.js';

/**
 * What the contract cannot know of a mapping: that its positions are on this vessel, that no column is used twice and
 * no position is given two columns (the same cycles would be posted twice).
 *
 * @throws InvalidRequestError with the path of each entry that is wrong
 */
export async function checkMapping(em: EntityManager, vesselId: string, mapping: LogMapping): Promise<void> {
  const positions = await em.find(Position, {
    vessel: vesselId,
    archivedAt: null,
    id: { $in: mapping.channels.map(({ positionId }) => positionId) },
  });
  const known = new Map(positions.map((position) => [position.id, position]));
  const fieldErrors: Record<string, string[]> = {};
  const columns = new Set('column' in mapping.time ? [mapping.time.column] : []);
  const taken = new Set<string>();
  mapping.channels.forEach(({ column, positionId }, i) => {
    if (columns.has(column)) {
      fieldErrors[`mapping.channels.${i}.column`] = [
        `The column "${column}" is used twice. Match each column once.`,
      ];
    }
    columns.add(column);
    const position = known.get(positionId);
    if (!position) {
      fieldErrors[`mapping.channels.${i}.positionId`] = ['This position is not on the rig of this vessel.'];
    } else if (taken.has(positionId)) {
      fieldErrors[`mapping.channels.${i}.positionId`] = [
        `Two columns are matched to ${position.label}. Keep the one whose sensor counts.`,
      ];
    }
    taken.add(positionId);
  });
  if (Object.keys(fieldErrors).length > 0) throw new InvalidRequestError(fieldErrors);
}
