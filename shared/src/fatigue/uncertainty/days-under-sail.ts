import { GRID_SIZE } from './damage-on-grid.js';
import type { DetailRecord, UseRecord } from './life-record.js';

/** Which hours of the record the scatter of weather is read from: those under sail; all where none are. */
export function groupsUnderSail(use: UseRecord): boolean[] {
  const sailed = use.groups.map(
    ({ state }, group) => state === 'sailing' && use.days.some((day) => (day.loggedHours[group] ?? 0) > 0),
  );
  return sailed.some(Boolean) ? sailed : use.groups.map(() => true);
}

/** Recorded hours under sail of each day. */
export function hoursUnderSail(use: UseRecord): Float64Array {
  const counted = groupsUnderSail(use);
  return Float64Array.from(use.days, (day) =>
    day.loggedHours.reduce((sum, hours, group) => sum + (counted[group] ? hours : 0), 0),
  );
}

/**
 * Damage under sail of each day, at the recorded gain. Days in harbour belong to another rate: how many of them a record
 * happens to hold says nothing about the weather at sea.
 */
export function damageUnderSail(use: UseRecord, detail: DetailRecord): Float64Array {
  const counted = groupsUnderSail(use);
  const middle = (GRID_SIZE - 1) / 2;
  const damage = new Float64Array(use.days.length);
  for (const { day, group, share } of detail.shares) {
    if (counted[group]) damage[day] += share * detail.grid.byDay[day * GRID_SIZE + middle];
  }
  return damage;
}
