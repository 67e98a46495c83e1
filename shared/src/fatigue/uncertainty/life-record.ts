import type { UsageGroup, UsageState } from '../usage/usage-state.js';
import type { YearProfile } from '../usage/year-profile.js';
import type { DamageGrid } from './damage-grid.js';

/** One day of the vessel's record. */
export interface UseDay {
  /** Season the day belongs to; days of one season share a factor. */
  season: number;
  /** Hours with recorded loads, by group. */
  loggedHours: readonly number[];
  /** Hours without, by group, as far as they are known for the day. */
  unloggedHours: readonly number[];
}

/** A stretch during which a load cell kept one gain. */
export interface CalibrationPeriod {
  /** Sensor and period; parts that name the same key share the draw. */
  key: string;
  gainCov: number;
}

/** How a vessel was used and will be: shared by all her parts, so that they live through the same weather. */
export interface UseRecord {
  groups: readonly UsageGroup[];
  /** In order of time. */
  days: readonly UseDay[];
  /** Hours without recorded loads that no day is known of, by group. */
  otherUnloggedHours: readonly number[];
  /** Hours planned per year, by state. States that are left out are not planned. */
  plannedHoursPerYear: Readonly<Partial<Record<UsageState, number>>>;
  /** Spread from one season to another, coefficient of variation. */
  seasonCov: number;
  calibrations: readonly CalibrationPeriod[];
  /** When in a year the hours fall; evenly where left out. */
  yearProfile?: YearProfile;
}

/** Where the damage of a recorded day comes from: so much of it in this group. The shares of a day add up to one. */
export interface DamageShare {
  /** Index in the days of the use record. */
  day: number;
  /** Index in its groups. */
  group: number;
  share: number;
}

/** The record and the doubts of one detail. */
export interface DetailRecord {
  key: string;
  name: string;
  /** On the mean curve, over the days of the use record in their order. */
  grid: DamageGrid;
  shares: readonly DamageShare[];
  /** Index of the calibration period of each day of the use record. */
  calibrationOfDay: readonly number[];
  /** Which days count towards this part's account; all where left out. A rate may stand on more days than the account. */
  posted?: readonly boolean[];
  /** Design damage over mean damage: 10^(k * s), 1 where the level of the curve is not known. */
  designOverMean: number;
  designFatigueFactor: number;
  /** Spread of its life about the mean curve, see curveLnSd. */
  curveLnSd: number;
  /** Doubt about the stress that follows from the load, see stressModelCov. */
  stressCov: number;
  /** What the recording rate missed: damage is multiplied by the factor, the spread is of its logarithm. */
  sampling: { factor: number; lnSd: number };
}

/** A fitted part with everything its dates follow from. */
export interface PartRecord {
  key: string;
  name: string;
  lossDropsMast: boolean;
  details: readonly DetailRecord[];
  /** Doubt about carrying the load from the sensor to the part, see basisCov. */
  basisCov: number;
  /** Sailing hours before the first log. */
  carriedInHours: number;
  /** Spread of the Miner sum at failure; 0.3 where left out. */
  minerCov?: number;
}

/** Spread of the Miner sum at failure, lognormal with mean 1. Source: JCSS Probabilistic Model Code part 3 (published). */
export const MINER_COV = 0.3;
