/** What a vessel was doing in an hour. */
export type UsageState = 'sailing' | 'motoring' | 'at-rest-afloat' | 'ashore-mast-up' | 'mast-out';

/** All states, hardest on the rig first. With the mast out nothing is loaded. */
export const USAGE_STATES: readonly UsageState[] = [
  'sailing',
  'motoring',
  'at-rest-afloat',
  'ashore-mast-up',
  'mast-out',
];

/** A state in a band of wind; the unit in which hours are recorded, posted and planned. */
export interface UsageGroup {
  state: UsageState;
  /** Index of the wind band, weakest first (Beaufort number or merged band); null where wind is not known. */
  band: number | null;
}
