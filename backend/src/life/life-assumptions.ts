import type { SpectrumDamage } from '@stayledger/shared/fatigue/damage/damage-of-spectrum';
import type { AssessedDetail } from './detail-models.js';
import type { StandingBasis } from './part-standing.service.js';

/** What the figures of a part rest on, in sentences for its page. The cautions come last and are always there. */
export function assumptionsOf(
  basis: StandingBasis,
  governing: AssessedDetail | null,
  result: SpectrumDamage | null,
): string[] {
  return [
    ...(governing ? curveSentences(governing, result) : []),
    ...(basis.logs.length > 0 ? recordingSentences(basis) : []),
    ...(basis.calendar ? [basis.calendar.words] : []),
    ...CAUTIONS,
  ];
}

function curveSentences({ curve, detail }: AssessedDetail, result: SpectrumDamage | null): string[] {
  const sentences = [
    `The ${detail.name} governs. Its curve is ${curve.name} (${curve.source}); provenance: ${curve.provenance}. ${curve.provenanceNote}`,
    curve.analogyNote,
    `Design fatigue factor ${detail.designFatigueFactor}: the allowance is used up when the damage sum reaches 1/${detail.designFatigueFactor}.`,
    ...detail.estimates.map((estimate) => `Estimate: ${estimate}`),
  ];
  if (result && result.rangeAboveValidity.limit !== null && result.rangeAboveValidity.cycles > 0) {
    sentences.push(
      `${result.rangeAboveValidity.cycles} cycles were larger than the tests behind the curve support (${result.rangeAboveValidity.limit} MPa); the curve is continued for them.`,
    );
  }
  return sentences;
}

function recordingSentences({ loggedHours, plan, logs }: StandingBasis): string[] {
  const sentences = [
    `${loggedHours.toFixed(0)} logged hours in ${logs.length === 1 ? 'one log' : `${logs.length} logs`} stand behind the figures.`,
    'Gaps in a recording are bridged by the loads on both sides, which is a lower bound; their hours are not logged hours.',
    'The part is taken to have begun slack, at zero load, before its first log; sailing before the first log is not in the account.',
    'Residues are counted as half cycles and joined across logs in time order.',
  ];
  if (plan !== null) {
    sentences.push(
      `The date supposes ${plan.sailingHoursPerYear} sailing hours a year like those that were logged; other weather or another crew use the allowance faster or slower.`,
    );
  }
  if (yearsOf(logs) < 2) {
    sentences.push('Only one season was recorded: how seasons differ on this vessel is not known yet.');
  }
  return sentences;
}

function yearsOf(logs: StandingBasis['logs']): number {
  return new Set(logs.map(({ fromOn }) => fromOn.slice(0, 4))).size;
}

const CAUTIONS = [
  'This is an estimate of a stated allowance. Corrosion, damage, defective parts or work, misalignment, overload and unrecorded events break rigs at any figure; it never replaces inspection by a competent person.',
  'Allowance left is no reason to pass a calendar limit, or one of the builder, the class society, the flag or the insurer.',
];
