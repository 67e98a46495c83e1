import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import { positionLabel } from '@stayledger/shared/rig/positions';
import { rigTemplate } from '@stayledger/shared/rig/templates/rig-template';
import {
  RIG_TEMPLATE_KEYS,
  RIG_TEMPLATE_NAMES,
  templateForRigType,
  type RigTemplateKey,
} from '@stayledger/shared/rig/templates/template-keys';
import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import { Attention } from '../../components/feedback/attention';
import { PlainSelect } from '../../components/forms/plain-fields';
import { useIdempotencyKey } from '../../components/forms/use-idempotency-key';
import { PlainButton } from '../../components/plain-button/plain-button';
import { applyTemplate } from './rig-start.mutations';
import styles from './rig-start.module.css';

interface TemplateStartProps {
  vessel: Pick<VesselDto, 'id' | 'rigType' | 'lengthM'>;
  onDone: () => void | Promise<void>;
}

/** Creates the places of a rig type at once; what would be made is listed before anything is. */
export function TemplateStart({ vessel, onDone }: TemplateStartProps) {
  const [template, setTemplate] = useState<RigTemplateKey>(templateForRigType(vessel.rigType));
  const [spreaders, setSpreaders] = useState('');
  const keyFor = useIdempotencyKey();
  const input = { template, ...(spreaders === '' ? {} : { spreaders: Number(spreaders) }) };
  const applying = useMutation({
    mutationFn: () => applyTemplate(vessel.id, input, keyFor(input)),
    onSuccess: onDone,
  });
  const { positions, geometry } = rigTemplate(template, { lengthM: vessel.lengthM, ...input });
  return (
    <section aria-labelledby="from-template" className={styles.start}>
      <h2 id="from-template">From a rig type</h2>
      <p>
        Port and starboard are made together. Heights and chainplates are what is usual for the type and this
        length: they place the lines of the drawing until somebody measures, and no load or date depends on
        them.
      </p>
      <div className={styles.fields}>
        <PlainSelect
          label="Rig type"
          value={template}
          onChange={(event) => setTemplate(event.target.value as RigTemplateKey)}
        >
          {RIG_TEMPLATE_KEYS.map((key) => (
            <option key={key} value={key}>
              {RIG_TEMPLATE_NAMES[key]}
            </option>
          ))}
        </PlainSelect>
        <PlainSelect
          label="Pairs of spreaders"
          value={spreaders}
          onChange={(event) => setSpreaders(event.target.value)}
        >
          <option value="">As usual for the type</option>
          {[0, 1, 2, 3, 4].map((pairs) => (
            <option key={pairs} value={pairs}>
              {pairs}
            </option>
          ))}
        </PlainSelect>
      </div>
      <p>
        {positions.length} places on{' '}
        {geometry.masts.length === 1 ? 'one mast' : `${geometry.masts.length} masts`}:{' '}
        {labelsOf(positions).join('; ')}. Places that are there already are kept.
      </p>
      {applying.error ? <Attention role="alert">{applying.error.message}</Attention> : null}
      <PlainButton weight="primary" disabled={applying.isPending} onClick={() => applying.mutate()}>
        {applying.isPending ? 'Creating…' : 'Create these places'}
      </PlainButton>
    </section>
  );
}

/** Pairs are said once: "Cap shroud, both sides". */
function labelsOf(positions: ReturnType<typeof rigTemplate>['positions']): string[] {
  return positions
    .filter(({ side }) => side !== 'starboard')
    .map(({ kind, side, mast }) => {
      const name = positionLabel(kind, 'centre', mast);
      return side === 'centre' ? name : `${name}, both sides`;
    });
}
