import { answeringGroups } from '../usage/answering-groups.js';
import type { UsageGroup } from '../usage/usage-state.js';
import type { UseRecord } from './life-record.js';

/**
 * Unlogged hours that no record answers for: more wind than was ever recorded in their state, or a state that was never
 * recorded. They are charged nothing and must be said beside every date. With the mast out there is nothing to cover.
 *
 * @returns groups with hours above zero
 */
export function notCoveredHours(use: UseRecord): (UsageGroup & { hours: number })[] {
  const logged = use.groups.map((_, group) =>
    use.days.reduce((sum, day) => sum + (day.loggedHours[group] ?? 0), 0),
  );
  const answering = answeringGroups(use.groups, logged);
  return use.groups.flatMap((group, index) => {
    if (group.state === 'mast-out' || answering[index].length > 0) return [];
    const hours =
      (use.otherUnloggedHours[index] ?? 0) +
      use.days.reduce((sum, day) => sum + (day.unloggedHours[index] ?? 0), 0);
    return hours > 0 ? [{ ...group, hours }] : [];
  });
}
