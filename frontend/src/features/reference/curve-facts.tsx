import type { CurveDto } from '@stayledger/shared/contracts/curves';
import type { ReactNode } from 'react';
import type { GlossaryWord } from '../../components/glossary/glossary';
import { Term } from '../../components/glossary/term';
import { useFormat } from '../../lib/formatting/use-format';
import {
  ENVIRONMENT_WORDS,
  LEVEL_WORDS,
  MEASURE_WORDS,
  measureUnit,
  PROVENANCE_WORDS,
} from './reference-words';
import styles from './reference.module.css';

/** What a curve is, what it may be used for, and where each statement comes from. */
export function CurveFacts({ curve }: { curve: CurveDto }) {
  const format = useFormat();
  const unit = measureUnit(curve.measure);
  const facts: [string, ReactNode, GlossaryWord?][] = [
    ['For', curve.appliesTo],
    ['Measure', `${MEASURE_WORDS[curve.measure]}${unit ? `, ${unit}` : ', without unit'}`],
    [
      'Level',
      curve.level === 'mean-minus-k-sd'
        ? `mean less ${format.significant(curve.k, 3)} standard deviations`
        : LEVEL_WORDS[curve.level],
      'level',
    ],
    [
      'Scatter',
      curve.sdLog10N === null
        ? 'the source gives none'
        : `standard deviation of log10 of cycles: ${format.significant(curve.sdLog10N, 3)}`,
      'scatter',
    ],
    ['Environment', ENVIRONMENT_WORDS[curve.environment]],
    ['Mean load', curve.meanLoad.reason, 'mean load'],
    [
      'Cut-off',
      curve.cutOffRange === null
        ? 'none: small ranges count too'
        : `${format.significant(curve.cutOffRange, 3)} ${unit}`,
      'cut-off',
    ],
    ['Holds', curve.validity.note],
    ['On rigging', curve.analogyNote],
    ['Source', curve.source],
    ['Where from', `${PROVENANCE_WORDS[curve.provenance]}. ${curve.provenanceNote}`],
    ['Version', curve.version],
    ['In use', curve.selectable ? 'may be chosen for a detail' : 'kept for reading, not for choosing'],
  ];
  return (
    <dl className={styles.facts}>
      {facts.map(([name, words, term]) => (
        <div key={name} style={{ display: 'contents' }}>
          <dt>{term ? <Term word={term}>{name}</Term> : name}</dt>
          <dd>{words}</dd>
        </div>
      ))}
    </dl>
  );
}
