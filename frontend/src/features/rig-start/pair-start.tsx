import { POSITION_KINDS } from '@stayledger/shared/rig/positions';
import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import { Attention } from '../../components/feedback/attention';
import { PlainSelect } from '../../components/forms/plain-fields';
import { useIdempotencyKey } from '../../components/forms/use-idempotency-key';
import { PlainButton } from '../../components/plain-button/plain-button';
import { addPair } from './rig-start.mutations';
import styles from './rig-start.module.css';

const PAIRED = POSITION_KINDS.filter(({ sides }) => sides.length === 2);
const MASTS = [
  ['main', 'Main mast'],
  ['fore', 'Fore mast'],
  ['mizzen', 'Mizzen mast'],
] as const;

/** Port and starboard of one stay, entered once. */
export function PairStart({ vesselId, onDone }: { vesselId: string; onDone: () => void | Promise<void> }) {
  const [kind, setKind] = useState('cap-shroud');
  const [mast, setMast] = useState('main');
  const keyFor = useIdempotencyKey();
  const adding = useMutation({
    mutationFn: () => addPair(vesselId, { kind, mast }, keyFor({ kind, mast })),
    onSuccess: onDone,
  });
  return (
    <section aria-labelledby="a-pair" className={styles.start}>
      <h2 id="a-pair">One pair</h2>
      <div className={styles.fields}>
        <PlainSelect label="Place" value={kind} onChange={(event) => setKind(event.target.value)}>
          {PAIRED.map((paired) => (
            <option key={paired.kind} value={paired.kind}>
              {paired.name}
              {paired.alias ? ` (${paired.alias})` : ''}
            </option>
          ))}
        </PlainSelect>
        <PlainSelect label="Mast" value={mast} onChange={(event) => setMast(event.target.value)}>
          {MASTS.map(([value, label]) => (
            <option key={value} value={value}>
              {label}
            </option>
          ))}
        </PlainSelect>
      </div>
      {adding.error ? <Attention role="alert">{adding.error.message}</Attention> : null}
      <PlainButton disabled={adding.isPending} onClick={() => adding.mutate()}>
        Add port and starboard
      </PlainButton>
    </section>
  );
}
