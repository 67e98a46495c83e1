import type { Provenance } from '../curves/curve.js';

/** How hard a part is used, for rules of thumb that give more than one figure. */
export type UsageClass = 'hard' | 'general' | 'light';

/** A calendar and distance rule of a material, from the reference data. */
export interface ReplacementRule {
  id: string;
  version: number;
  name: string;
  /** 'replace' ends the part at the age; 'inspect' asks for it to be opened and looked at. */
  action: 'replace' | 'inspect';
  /** Years from fitting: hard use (charter, tropics), general use, light coastal use. */
  years: Record<UsageClass, number>;
  /** Age nobody should pass whatever the use, where the trade names one. */
  limitYears: number | null;
  /** Nautical miles after which the trade replaces, where it names a figure. */
  distanceNm: number | null;
  advice: string;
  source: string;
  provenance: Provenance;
  provenanceNote: string;
}
