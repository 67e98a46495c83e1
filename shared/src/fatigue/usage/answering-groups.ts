import type { UsageGroup } from './usage-state.js';

/**
 * Which recorded groups answer for the damage per hour of each group: itself where it was recorded; all of its state
 * where its wind is not known; else the next recorded band above. Above the highest recorded band nothing answers:
 * rates are never extrapolated, such hours are not covered.
 *
 * @param loggedHours recorded hours by group
 * @returns indices of groups, one list per group; empty where its hours are not covered
 */
export function answeringGroups(groups: readonly UsageGroup[], loggedHours: ArrayLike<number>): number[][] {
  return groups.map(({ state, band }, own) => {
    if (loggedHours[own] > 0) return [own];
    const recorded = groups.flatMap((group, index) =>
      group.state === state && loggedHours[index] > 0 ? [index] : [],
    );
    if (band === null) return recorded;
    const above = recorded
      .filter((index) => (groups[index].band ?? -Infinity) > band)
      .sort((one, other) => (groups[one].band ?? 0) - (groups[other].band ?? 0));
    return above.slice(0, 1);
  });
}
