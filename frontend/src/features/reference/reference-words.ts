import type { CurveDto } from '@stayledger/shared/contracts/curves';

export const MEASURE_WORDS: Record<CurveDto['measure'], string> = {
  'stress-nominal': 'nominal stress range',
  'stress-metallic': 'stress range on the metallic area',
  'stress-thread': 'stress range on the tensile stress area of the thread',
  'stress-shear': 'shear stress range',
  'load-ratio': 'load range over breaking load',
};

export function measureUnit(measure: CurveDto['measure']): string {
  return measure === 'load-ratio' ? '' : 'MPa';
}

export const LEVEL_WORDS: Record<CurveDto['level'], string> = {
  mean: 'mean of the tests: half of the pieces failed earlier',
  'mean-minus-k-sd': 'mean less a number of standard deviations',
  'fractile-95-75': 'survived by 95 % of pieces, at 75 % confidence',
  unknown: 'the source does not say',
};

export const ENVIRONMENT_WORDS: Record<CurveDto['environment'], string> = {
  air: 'in air',
  'corrosion-protected': 'protected against corrosion',
  'seawater-cathodic-protection': 'in sea water, cathodically protected',
  'seawater-free-corrosion': 'in sea water, corroding freely',
};

/** Where a figure comes from, said so that nobody takes an estimate for a standard. */
export const PROVENANCE_WORDS: Record<CurveDto['provenance'], string> = {
  published: 'published, read in the source itself',
  'published, secondary': 'published, read in a second-hand account of the source',
  'from memory': 'from memory, not yet checked against the source',
  estimate: 'an estimate of ours, without a source',
  derived: 'derived from published figures',
};

export const PROVENANCE_SHORT: Record<CurveDto['provenance'], string> = {
  published: 'Published',
  'published, secondary': 'Second-hand',
  'from memory': 'From memory',
  estimate: 'Estimate',
  derived: 'Derived',
};
